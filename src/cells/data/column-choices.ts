import type { ColumnAgreement, Upload, UploadColumn } from "../../../shared/schemas/resources.ts";
import { readName } from "../../../shared/study/column-meaning.ts";
import { suggestGoods } from "../../../shared/study/suggest.ts";
import { counted } from "../../../shared/study/words.ts";
import { printCount, printPercent, THIN_SPACE } from "../../../shared/tables/numbers.ts";

/** A column as it is offered, with what helps to tell it from others. */
export interface ColumnChoice {
  readonly name: string;
  /** What its name says it is: "price of grains", "may be a weight". */
  readonly meaning?: string;
  /** How it lies: "0.5 to 12, 3.2 % zero". */
  readonly lies: string;
  /** Its first values: "1.2, 0.9, 1.4". */
  readonly values?: string;
  /** What it says again that other columns say, in sentences. */
  readonly agreements: readonly string[];
}

/** The columns a key may name, in the order of the file, then the derived ones. */
export function columnChoices(
  upload: Upload | undefined,
  derived: readonly string[],
  numbersOnly: boolean,
): ColumnChoice[] {
  const columns = upload?.columns.filter((column) => !numbersOnly || column.type === "number") ?? [];
  const meanings = upload ? meaningsOf(upload.columns) : new Map<string, string>();
  return [
    ...columns.map((column) => ({
      name: column.name,
      ...(meanings.has(column.name) && { meaning: meanings.get(column.name) }),
      lies: lies(column, upload?.rows || 1),
      ...(column.firstValues?.length && { values: column.firstValues.map(withMinus).join(", ") }),
      agreements: (column.agreements ?? []).map(agreementInWords),
    })),
    ...derived.map((name) => ({ name, lies: "derived", agreements: [] })),
  ];
}

const withMinus = (value: string) => value.replace(/^-(?=[\d.])/, "\u2212");
const short = (value: number) => withMinus(String(Number(value.toPrecision(4))));

function lies(column: UploadColumn, rows: number): string {
  const { type, minimum, maximum, zeros, missing, distinct } = column;
  const range =
    type === "text"
      ? `text, ${counted(distinct, "value")}`
      : minimum === undefined || maximum === undefined
        ? "no numbers"
        : minimum === maximum
          ? `always ${short(minimum)}`
          : `${short(minimum)} to ${short(maximum)}`;
  return [
    range,
    zeros ? `${printPercent(zeros / rows)} zero` : "",
    missing ? `${printPercent(missing / rows)} missing` : "",
  ]
    .filter(Boolean)
    .join(", ");
}

const ROLES = { total: "total expenditure", weight: "a weight", cluster: "a cluster", time: "the time" } as const;

/** What columns are by their names; what a role suggests goes before what a good's name does. */
function meaningsOf(columns: readonly UploadColumn[]): Map<string, string> {
  const suggestion = suggestGoods(columns);
  const meanings = new Map<string, string>();
  for (const { name, type } of columns) {
    const read = type === "number" ? readName(name) : undefined;
    if (read === undefined) continue;
    const good = read.stem.replaceAll("_", " ");
    meanings.set(name, read.meaning === "expenditure" ? `expenditure on ${good}` : `${read.meaning} of ${good}`);
  }
  for (const name of suggestion.demographics) meanings.set(name, "may describe who buys");
  for (const [role, words] of Object.entries(ROLES)) {
    const name = suggestion[role as keyof typeof ROLES];
    if (name !== undefined) meanings.set(name, `may be ${words}`);
  }
  return meanings;
}

/** A price times a quantity that misses the expenditure in more than a twentieth of the rows is worth a word. */
const MOSTLY = 0.95;

/** "p_milk × q_milk is e_milk within 2 %, in 4,700 of 4,812 rows." */
export function agreementInWords({ of, times, is, agree, compared }: ColumnAgreement): string {
  if (compared === 0) return `No row has ${[...of, is].join(" and ")}.`;
  const left = [...(times === 1 ? [] : [short(times)]), ...of].join(" × ");
  const rows = `in ${printCount(agree)} of ${counted(compared, "row")}`;
  const said = `${left} is ${is} within 2${THIN_SPACE}%, ${rows}.`;
  if (agree < MOSTLY * compared) return `${said} They do not say the same.`;
  return of.length === 2 && times !== 1 ? `${said} Their units differ.` : said;
}
