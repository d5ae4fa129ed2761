import type { RowChange, RowGap } from "../../../shared/economics/price-change/row-change.ts";
import type { NamedRow } from "../../../shared/schemas/price-change.ts";

/** More are not listed; all are counted. */
const MOST_NAMED = 500;

/** A row to name, with how far out it is: without an answer first, then by the share furthest outside [0, 1]. */
interface Weighed {
  readonly severity: number;
  readonly named: Omit<NamedRow, "notDefined"> & { readonly gap?: RowGap };
}

export interface NamedRows {
  readonly count: number;
  readonly worst: readonly Weighed[];
}

interface Collector {
  /** Notes the row where it is to be named; whose shares leave [0, 1]. */
  add(rowNumber: number, total: number, row: RowChange): { readonly system: boolean; readonly household: boolean };
  result(): NamedRows;
}

const NOWHERE = { system: false, household: false };

/** Collects rows where the answer is not defined, or a share leaves [0, 1]; nothing is kept of the others. */
export function namedRows(goods: readonly string[]): Collector {
  const worst: Weighed[] = [];
  let count = 0;
  /** Rows less severe than this are not among the worst. */
  let least = 0;
  const keep = (severity: number, named: () => Weighed["named"]) => {
    count++;
    if (severity < least) return;
    worst.push({ severity, named: named() });
    if (worst.length < 4 * MOST_NAMED) return;
    keepWorst(worst);
    least = worst[worst.length - 1].severity;
  };
  return {
    add(rowNumber, total, row) {
      const { gap } = row;
      if (gap !== undefined) {
        keep(Number.POSITIVE_INFINITY, () => ({ row: rowNumber, total, gap, outside: [] }));
        return NOWHERE;
      }
      const system = Math.max(furthest(row.predictedBefore), furthest(row.predictedAfter));
      const household = furthest(row.ownAfter);
      if (system <= 0 && household <= 0) return NOWHERE;
      keep(Math.max(system, household), () => ({ row: rowNumber, total, outside: outsideOf(row, goods) }));
      return { system: system > 0, household: household > 0 };
    },
    result: () => {
      keepWorst(worst);
      return { count, worst };
    },
  };
}

/** Those of several ranges of rows, in their order. */
export function mergeNamed(parts: readonly NamedRows[]): NamedRows {
  const worst = parts.flatMap((part) => part.worst);
  keepWorst(worst);
  return { count: parts.reduce((sum, part) => sum + part.count, 0), worst };
}

function keepWorst(worst: Weighed[]): void {
  // Infinity − Infinity is no number: equal ones stand in the order of the rows.
  worst.sort((a, b) => (a.severity === b.severity ? a.named.row - b.named.row : b.severity - a.severity));
  worst.length = Math.min(worst.length, MOST_NAMED);
}

/** How far the shares leave [0, 1] at most; none where they do not. */
function furthest(shares: Float64Array): number {
  let most = 0;
  for (let i = 0; i < shares.length; i++) {
    const out = shares[i] < 0 ? -shares[i] : shares[i] - 1;
    if (out > most) most = out;
  }
  return most;
}

function outsideOf(row: RowChange, goods: readonly string[]): NamedRow["outside"] {
  const looked = [
    ["system", "before", row.predictedBefore],
    ["system", "after", row.predictedAfter],
    ["household", "after", row.ownAfter],
  ] as const;
  return looked.flatMap(([of, when, shares]) =>
    goods.flatMap((good, i) => (shares[i] < 0 || shares[i] > 1 ? [{ good, share: shares[i], of, when }] : [])),
  );
}
