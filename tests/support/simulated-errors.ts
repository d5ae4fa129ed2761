import type { Random } from "../../shared/numerics/random.ts";

/**
 * How the errors of the equations are made. "in clusters": rows that share prices share a part of their error.
 * "autocorrelated": errors and log prices follow an autoregression, rows being periods.
 */
export type ErrorKind = "independent" | "heteroskedastic" | "in clusters" | "autocorrelated";

export interface Design {
  readonly goods: number;
  readonly rows: number;
  readonly random: Random;
  readonly errors: ErrorKind;
  /** Standard deviations of errors and of log prices. */
  readonly noise: number;
  readonly prices: number;
  /** Where errors are in clusters. */
  readonly rowsOfACluster?: number;
}

export interface MadeRows {
  readonly logPrices: Float64Array[];
  /** They sum to zero over goods. */
  readonly errors: Float64Array[];
  /** The number of each row's cluster. */
  readonly cluster: Float64Array;
}

/** Autocorrelation of one period. */
const PERSISTENCE = 0.4;

/** Log prices and errors by row, n columns each. */
export function madeRows({ goods, rows, random, errors: kind, noise, prices, rowsOfACluster = 4 }: Design): MadeRows {
  const normals = () => Float64Array.from({ length: rows }, () => random.normal());
  const cluster = Float64Array.from({ length: rows }, (_, t) => Math.floor(t / rowsOfACluster));
  const columns = (draw: () => Float64Array) => Array.from({ length: goods }, draw);
  const ofClusters = () => {
    const values = normals();
    return values.map((_, t) => values[t - (t % rowsOfACluster)]);
  };
  const draw = { "in clusters": ofClusters, autocorrelated: () => persistent(normals()) }[kind as string] ?? normals;
  const logPrices = columns(draw).map((column) => column.map((value) => prices * value));
  const scale = (t: number) => noise * (kind === "heteroskedastic" ? 0.3 + Math.abs(logPrices[0][t]) / prices : 1);
  // Goods differ in how much their errors vary, and errors are correlated between goods.
  const common = draw();
  const own = columns(draw).map((column, i) =>
    column.map((value, t) => scale(t) * (1 + 0.2 * i) * (value + 0.3 * common[t])),
  );
  const ofRows =
    kind === "in clusters" ? columns(normals).map((column) => column.map((value) => 0.7 * noise * value)) : [];
  return { logPrices, errors: summingToZero(own, ofRows), cluster };
}

/** A stationary autoregression of variance one. */
function persistent(innovations: Float64Array): Float64Array {
  const values = innovations.slice();
  const fresh = Math.sqrt(1 - PERSISTENCE ** 2);
  for (let t = 1; t < values.length; t++) values[t] = PERSISTENCE * values[t - 1] + fresh * innovations[t];
  return values;
}

function summingToZero(columns: readonly Float64Array[], added: readonly Float64Array[]): Float64Array[] {
  const sums = columns.map((column, i) => column.map((value, t) => value + (added[i]?.[t] ?? 0)));
  return sums.map((column) =>
    column.map((value, t) => value - sums.reduce((sum, other) => sum + other[t], 0) / sums.length),
  );
}
