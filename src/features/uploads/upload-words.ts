import type { Upload } from "../../../shared/schemas/resources.ts";
import { whenInWords } from "../../lib/dates.ts";
import { writeCount } from "../../lib/formats.ts";

const SEPARATORS = { ",": "commas", ";": "semicolons", "\t": "tabs" } as const;

/** "4,938 rows, 31 columns". */
export function shapeInWords({ rows, columns }: Pick<Upload, "rows" | "columns">): string {
  return `${writeCount(rows, "row")}, ${writeCount(columns.length, "column")}`;
}

/** "uploaded by Ilse Marchetti at 11:20; parted by semicolons, decimal commas". */
export function originInWords(upload: Upload): string {
  const { uploadedBy, uploadedAt, fileName, name } = upload;
  const called = fileName === undefined || fileName === name ? "" : ` as ${fileName}`;
  return `uploaded by ${uploadedBy}, ${whenInWords(uploadedAt)}${called}; ${formatInWords(upload)}`;
}

function formatInWords({ format, separator, decimalComma, sheet }: Upload): string {
  if (format === "parquet") return "a Parquet file";
  if (format === "xlsx") return `sheet ${sheet} of a workbook`;
  return `parted by ${SEPARATORS[separator ?? ","]}${decimalComma ? ", decimal commas" : ""}`;
}
