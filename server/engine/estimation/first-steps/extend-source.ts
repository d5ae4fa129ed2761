import { printCount } from "../../../../shared/tables/numbers.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import { Refusal } from "../../refusal.ts";
import type { MomentSource, TermPair } from "../moment-source.ts";
import { askedFirstStage, askedParticipation, type FirstSteps } from "./asked.ts";
import { kindsOf } from "./extensions.ts";

/** Bytes that the columns of the two steps may take. */
const MOST_BYTES = 2e9;

/**
 * The rows of a system with the columns its first steps add, in the order `Extension` lays their terms out. `rowsOf`
 * brings a column of the data to the rows of the equations.
 *
 * Errors: those of the first steps; columns that take more memory than there is.
 */
export function withFirstStepColumns(
  source: MomentSource,
  data: PreparedData,
  { instruments, participation }: FirstSteps,
  demographics: readonly string[],
  rowsOf: (column: Float64Array) => Float64Array,
): MomentSource {
  let extended = source;
  if (instruments) {
    const { residuals } = askedFirstStage(data, instruments, demographics);
    extended = withColumns(extended, [{ label: "the residual of the first stage", values: rowsOf(residuals) }]);
  }
  if (participation) extended = inTwoSteps(extended, data, participation, demographics, rowsOf);
  return extended;
}

interface Column {
  readonly label: string;
  readonly values: Float64Array;
}

function withColumns(source: MomentSource, columns: readonly Column[]): MomentSource {
  const before = source.columns.length;
  return {
    ...source,
    columns: [...source.columns, ...columns.map(({ values }) => values)],
    columnLabels: [...source.columnLabels, ...columns.map(({ label }) => label)],
    ...(source.groups && { groups: [...source.groups, ...columns.map(() => 0)] }),
    terms: [...source.terms, ...columns.map((_, at): TermPair => [0, before + 1 + at])],
  };
}

function inTwoSteps(
  source: MomentSource,
  data: PreparedData,
  columns: readonly string[],
  demographics: readonly string[],
  rowsOf: (column: Float64Array) => Float64Array,
): MomentSource {
  const { goods } = askedParticipation(data, columns, demographics);
  const { sometimes, always } = kindsOf(goods);
  const bytes = 8 * source.rows * sometimes.length * source.terms.length;
  if (bytes > MOST_BYTES) {
    const sentence = `Two steps need the ${printCount(source.terms.length)} terms of the system again for each of ${sometimes.length} goods with zeros, ${printCount(bytes / 1e6)} megabytes for ${printCount(source.rows)} rows where at most ${printCount(MOST_BYTES / 1e6)} are kept: la-aids has fewer terms.`;
    throw new Refusal([{ sentence, key: ["zeros"] }]);
  }
  const terms = source.terms.map((term) => ({ label: labelOf(term, source), values: termValues(term, source) }));
  const scaled = sometimes.flatMap((good) => {
    const probability = rowsOf(goods[good].step!.probability);
    return terms.map(({ label, values }) => ({
      label: `${label} times the probability that ${goods[good].good} is bought`,
      values: values.map((value, t) => value * probability[t]),
    }));
  });
  const densities = sometimes.map((good) => ({
    label: `the density of the probit of ${goods[good].good}`,
    values: rowsOf(goods[good].step!.density),
  }));
  const { groups: _, ...plain } = source;
  const bare: MomentSource = always ? source : { ...plain, columns: [], columnLabels: [], terms: [[0, 0]] };
  return withColumns({ ...bare, responses: addingUp(source.responses) }, [...scaled, ...densities]);
}

/** w_i − (Σ_j w_j − 1)/n: the shares themselves, as they add up; what predictions are centred by, whatever they do. */
function addingUp(responses: readonly Float64Array[]): Float64Array[] {
  const n = responses.length;
  const excess = responses[0].map((_, t) => (responses.reduce((sum, share) => sum + share[t], 0) - 1) / n);
  return responses.map((share) => share.map((value, t) => value - excess[t]));
}

function termValues(term: TermPair, { rows, columns }: MomentSource): Float64Array {
  const values = new Float64Array(rows).fill(1);
  for (const place of term) {
    if (place === 0) continue;
    const column = columns[place - 1];
    for (let t = 0; t < rows; t++) values[t] *= column[t];
  }
  return values;
}

function labelOf(term: TermPair, { columnLabels }: MomentSource): string {
  const factors = term.filter((place) => place !== 0).map((place) => columnLabels[place - 1]);
  return factors.length === 0 ? "the constant" : factors.join(" times ");
}
