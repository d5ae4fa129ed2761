import type { SystemSize } from "../../../../shared/systems/demand-system.ts";
import { easiPlaces } from "../../../../shared/systems/easi-layout.ts";
import { easiMoments } from "../../../../shared/systems/easi-moments.ts";
import type { BaseColumn, MomentTerm } from "../../../../shared/systems/moment-form.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import { demographicColumn } from "../../columns/seasonal-terms.ts";
import { type MomentSource, ordered, type TermPair } from "../moment-source.ts";
import type { RealExpenditure } from "./exact-rows.ts";

/** Which of a source's terms are Z, the equations', and which are H, their instruments. */
export interface ExactSource extends MomentSource {
  readonly equationTerms: number;
  readonly instruments: readonly number[];
  /** Places of y, y², …, y^R among the columns, counted from 1. */
  readonly powers: readonly number[];
}

/**
 * The rows with y at some θ: terms of the share equations first, then those of the instruments that are not among
 * them. Instruments are the same terms with the mean shares in y for the current ones (Lewbel & Pendakur 2009).
 * `prices` stand for the log prices where they are whitened.
 */
export function exactSource(
  data: PreparedData,
  demographics: readonly string[],
  size: SystemSize,
  { implicit, instrument }: Pick<RealExpenditure, "implicit" | "instrument">,
  prices: readonly Float64Array[] = data.logPrices,
): ExactSource {
  const n = size.goods;
  const s = demographics.length;
  const { degree } = easiPlaces(size);
  const powers = (of: Float64Array) => Array.from({ length: degree }, (_, r) => of.map((value) => value ** (r + 1)));
  const placeOf = (column: BaseColumn, instrumented: boolean): number => {
    if (column.kind === "log price") return 1 + column.good;
    if (column.kind === "demographic") return 1 + n + column.index;
    if (column.kind === "real expenditure") return n + s + column.power + (instrumented ? degree : 0);
    throw new RangeError(`easi has no column of ${column.kind}`);
  };
  const pairOf = (term: MomentTerm, instrumented: boolean): TermPair => {
    if (term.kind === "constant") return [0, 0];
    if (term.kind === "column") return [0, placeOf(term.column, instrumented)];
    if (term.kind === "monomial") throw new RangeError("easi has no product of more than two columns");
    return ordered(placeOf(term.left, instrumented), placeOf(term.right, instrumented));
  };
  const equations = easiMoments.terms(size);
  const terms = equations.map((term) => pairOf(term, false));
  const instruments = equations.map((term) => {
    const pair = pairOf(term, true);
    const place = terms.findIndex(([left, right]) => left === pair[0] && right === pair[1]);
    return place >= 0 ? place : terms.push(pair) - 1;
  });
  const power = (r: number) => (r === 0 ? "real expenditure" : `real expenditure to the power ${r + 1}`);
  const labels = Array.from({ length: degree }, (_, r) => power(r));
  return {
    rows: data.rows,
    columns: [
      ...prices,
      ...demographics.map((name) => demographicColumn(data, name)!),
      ...powers(implicit),
      ...powers(instrument),
    ],
    columnLabels: [
      ...data.goods.map((good) => `ln price of ${good}`),
      ...demographics,
      ...labels,
      ...labels.map((label) => `${label} at mean shares`),
    ],
    terms,
    responses: data.shares,
    responseLabels: data.goods.map((good) => `the share of ${good}`),
    ...(data.weights && { weights: data.weights }),
    equationTerms: equations.length,
    instruments,
    powers: Array.from({ length: degree }, (_, r) => n + s + r + 1),
  };
}
