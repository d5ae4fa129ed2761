import { Refusal } from "../refusal.ts";
import { Cancelled, type RunControl } from "../run.ts";
import { criticalIndex } from "./critical-index.ts";
import { isWeakly, preferenceClasses, STRICT, shortestPath } from "./preference-graph.ts";

/** What was bought at which prices: T rows, n goods, a column a good. Any units, the same in every row. */
export interface Purchases {
  readonly prices: readonly Float64Array[];
  readonly quantities: readonly Float64Array[];
  /** Of each row, its number in the upload. */
  readonly rowNumbers: ArrayLike<number>;
}

export interface RevealedPreference {
  readonly rows: number;
  /** Ordered pairs (i, j) with i revealed preferred to j, directly or not, and j strictly so to i. */
  readonly pairs: number;
  /** Of those, pairs that need no third row: i directly revealed preferred to j. */
  readonly directPairs: number;
  /** Rows in some such pair. */
  readonly rowsInvolved: number;
  /** Afriat's critical cost efficiency index. */
  readonly index: number;
  /** Rows of the upload, each revealed preferred to the next and the last strictly to the first; empty without violations. */
  readonly cycle: number[];
}

/** T² ratios are held at once: 72 MB at this many rows. */
export const MOST_ROWS = 3000;

/**
 * The generalised axiom of revealed preference and Afriat's critical cost efficiency index (Varian 1982,
 * Econometrica 50; Afriat 1973, International Economic Review 14), from what each row's purchases would have
 * cost at every other row's prices, C_ij = p_i·x_j.
 *
 *     i R j:  C_ii ≥ C_ij      i P j:  C_ii > C_ij      violated by (i, j):  i R … R j and j P i
 *
 * As j P i makes j R i, both rows of a violation lie in one strongly connected class of R: classes stand in for
 * the transitive closure. Comparisons carry a relative tolerance of 1e-12, so that identical weeks are ties.
 * Weights and clusters do not enter.
 *
 * Errors: `Refusal` above `MOST_ROWS` rows; `Cancelled`.
 */
export function revealedPreference(purchases: Purchases, control: RunControl): RevealedPreference {
  const rows = purchases.rowNumbers.length;
  refuseTooManyRows(rows);
  const ratios = costRatios(purchases, control);
  const { classOf, sizes } = preferenceClasses(ratios, rows);
  let pairs = 0;
  let directPairs = 0;
  let first: readonly [number, number] | undefined;
  const involved = new Uint8Array(rows);
  for (let i = 0; i < rows; i++) {
    if (sizes[classOf[i]] === 1) continue;
    for (let j = 0; j < rows; j++) {
      if (i === j || classOf[i] !== classOf[j] || !(ratios[j * rows + i] < STRICT)) continue;
      pairs++;
      if (isWeakly(ratios[i * rows + j])) directPairs++;
      involved[i] = involved[j] = 1;
      first ??= [i, j];
    }
  }
  return {
    rows,
    pairs,
    directPairs,
    rowsInvolved: involved.reduce((sum, one) => sum + one, 0),
    index: pairs === 0 ? 1 : criticalIndex(ratios, rows, { classOf, sizes }, control),
    cycle: first ? shortestPath(ratios, rows, ...first).map((row) => purchases.rowNumbers[row]) : [],
  };
}

function refuseTooManyRows(rows: number): void {
  if (rows <= MOST_ROWS) return;
  throw new Refusal(
    `Revealed preference compares every row with every other: the data have ${rows} rows used, and at most ${MOST_ROWS} can be compared.`,
  );
}

/** C_ij/C_ii, T × T row by row. */
function costRatios({ prices, quantities, rowNumbers }: Purchases, control: RunControl): Float64Array {
  const rows = rowNumbers.length;
  const ratios = new Float64Array(rows * rows);
  for (let i = 0; i < rows; i++) {
    if (control.cancelled()) throw new Cancelled("cancelled while comparing rows");
    if (i % 256 === 0) control.progress({ step: "comparing rows", fraction: i / rows });
    const row = ratios.subarray(i * rows, (i + 1) * rows);
    prices.forEach((price, good) => {
      const quantity = quantities[good];
      for (let j = 0; j < rows; j++) row[j] += price[i] * quantity[j];
    });
    const own = row[i];
    for (let j = 0; j < rows; j++) row[j] /= own;
  }
  return ratios;
}
