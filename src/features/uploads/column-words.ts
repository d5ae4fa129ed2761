import type { UploadColumn } from "../../../shared/schemas/resources.ts";
import { counted } from "../../../shared/study/words.ts";
import { printPercent } from "../../../shared/tables/numbers.ts";

const short = (value: number | undefined) => String(Number(value?.toPrecision(4))).replace("-", "\u2212");

/** How a column lies in the whole upload: "0.5 to 12, 3.2 % missing", "text, 198 different". */
export function columnInWords({ type, minimum, maximum, missing, distinct }: UploadColumn, rows: number): string {
  const lies =
    type === "text"
      ? `text, ${counted(distinct, "value")}`
      : minimum === undefined
        ? "no numbers"
        : minimum === maximum
          ? `always ${short(minimum)}`
          : `${short(minimum)} to ${short(maximum)}`;
  return missing === 0 ? lies : `${lies}; ${printPercent(missing / Math.max(1, rows))} missing`;
}
