import type { Finding } from "../schemas/cell.ts";
import { withoutDraws } from "../study/without-draws.ts";

/** Lists of rows of the upload, by the names of their keys: they point at single households. */
const ROWS = new Set(["rows", "firstRows", "brokenRows", "cycle"]);
/** Lowest and highest prices of the sample, each some household's own. */
const EXTREMES = new Set(["priceRange", "unseen"]);
/**
 * A finding as it may leave without its data: no row's number, no row's values. Of a data cell that is the accounting
 * in counts, the mean total and the fingerprint; of every other cell, all but lists of rows.
 */
export function withoutHouseholds(finding: Finding): object {
  if (finding.kind === "data") {
    const { kind, dataFingerprint, meanTotal, weighted, accounting } = finding;
    const leftOut = accounting.leftOut.map(({ reason, label, count }) => ({ reason, label, count }));
    return {
      kind,
      dataFingerprint,
      meanTotal,
      weighted,
      accounting: { uploaded: accounting.uploaded, leftOut, used: accounting.used },
    };
  }
  const plain = finding.kind === "system" ? withoutDraws(finding) : finding;
  return withoutRows(plain) as object;
}

function withoutRows(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(withoutRows);
  if (typeof value !== "object" || value === null) return value;
  const kept = Object.entries(value).filter(
    ([key, inner]) => !(ROWS.has(key) && Array.isArray(inner)) && !EXTREMES.has(key),
  );
  return Object.fromEntries(kept.map(([key, inner]) => [key, withoutRows(inner)]));
}

/** The same for its tables: all lists are there, and those of rows and extremes hold nothing. */
export function tabledWithoutHouseholds(finding: Finding): Finding | undefined {
  // Means and deviations of every column stand beside their extremes.
  if (finding.kind === "data") return undefined;
  if (finding.kind !== "price change") return finding;
  const { incidence, ...rest } = finding;
  return {
    ...rest,
    unseen: [],
    ...(incidence && { incidence: { ...incidence, brokenRows: [], unseen: [] } }),
  };
}
