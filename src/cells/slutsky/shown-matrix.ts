import { printFixed, printPowerOfTen } from "../../../shared/tables/numbers.ts";
import {
  type MatrixFinding,
  type MatrixForm,
  type MatrixInForm,
  matrixInForm,
  printEntry,
} from "../../../shared/tables/slutsky-matrix.ts";
import { normalInterval } from "./intervals.ts";
import { scaleSteps } from "./scale.ts";

/** How the matrix's field is set: with errors, without, small for many goods, or in thousandths on a phone. */
export type MatrixSetting = "errors" | "plain" | "many" | "phone";

/** More goods than this get small cells. */
const MANY_GOODS = 12;

export function matrixSetting(goods: number, phone: boolean, errors: boolean): MatrixSetting {
  if (phone) return "phone";
  if (goods > MANY_GOODS) return "many";
  return errors ? "errors" : "plain";
}

/** The matrix as its field prints it. */
export interface ShownMatrix {
  readonly form: MatrixForm;
  readonly goods: readonly string[];
  readonly entries: readonly (readonly number[])[];
  /** In full, as the panel and the reader of the page have it. */
  readonly full: (value: number) => string;
  /** As the cell has room for it. */
  readonly short: (value: number) => string;
  readonly errors: readonly (readonly number[])[];
  /** The 95 % interval of an entry: the bootstrap's percentiles where there are some, else by the normal distribution. */
  readonly intervalAt: (i: number, j: number) => readonly [low: number, high: number];
  readonly steps: readonly number[];
  /** What the short numbers are in: "thousandths". */
  readonly unit: string;
  readonly name: string;
}

function intervalOf({ entries, errors, intervals }: MatrixInForm, i: number, j: number): readonly [number, number] {
  if (intervals) return [intervals.low[i][j], intervals.high[i][j]];
  return normalInterval(entries[i][j], errors[i][j]);
}

/** Three digits of the largest entry, for cells with room for no more. */
function shortest(entries: readonly (readonly number[])[]) {
  const largest = entries.flat().reduce((most, entry) => Math.max(most, Math.abs(entry)), Number.MIN_VALUE);
  const exponent = Math.floor(Math.log10(largest)) - 2;
  const unit = exponent === 0 ? "" : `in ${printPowerOfTen(exponent)}`;
  return { unit, short: (value: number) => printFixed(value / 10 ** exponent, 0) };
}

export function shownMatrix(finding: MatrixFinding, form: MatrixForm, setting: MatrixSetting): ShownMatrix {
  const shown = matrixInForm(finding, form);
  const full = (value: number) => printEntry(value, shown);
  const common = {
    form,
    goods: finding.fitted.goods,
    entries: shown.entries,
    errors: shown.errors,
    intervalAt: (i: number, j: number) => intervalOf(shown, i, j),
    steps: scaleSteps(form, shown.entries),
    name: shown.name,
    full,
  };
  if (setting === "errors" || setting === "plain") return { ...common, short: full, unit: "" };
  if (form === "quantity") return { ...common, ...shortest(shown.entries) };
  if (setting === "many") return { ...common, short: (value) => printFixed(value, 3), unit: "" };
  return { ...common, short: (value) => printFixed(value * 1000, 0), unit: "thousandths" };
}
