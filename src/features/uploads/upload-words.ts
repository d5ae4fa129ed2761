import type { Upload } from "../../../shared/schemas/resources.ts";
import { counted } from "../../../shared/study/words.ts";
import { whenInWords } from "../../lib/dates.ts";

const SEPARATORS: Readonly<Record<Upload["separator"], string>> = { ",": "commas", ";": "semicolons", "\t": "tabs" };

/** "4,938 rows, 31 columns". */
export function shapeInWords({ rows, columns }: Upload): string {
  return `${counted(rows, "row")}, ${counted(columns.length, "column")}`;
}

/** "uploaded by Ilse Marchetti at 11:20; parted by semicolons, decimal commas". */
export function originInWords({ uploadedBy, uploadedAt, separator, decimalComma }: Upload): string {
  const decimals = decimalComma ? ", decimal commas" : "";
  return `uploaded by ${uploadedBy}, ${whenInWords(uploadedAt)}; parted by ${SEPARATORS[separator]}${decimals}`;
}
