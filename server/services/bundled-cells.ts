import type { CellKind, Finding, FindingOf } from "../../shared/schemas/cell.ts";
import type { CellStatus } from "../../shared/schemas/status.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import type { ResolvedCell } from "../../shared/study/resolve.ts";
import { ServiceError } from "../errors.ts";
import { refuseOneHousehold } from "./one-household.ts";

export interface BundledSource {
  readonly cell: CellSource;
  readonly resolved: ResolvedCell;
  readonly fingerprint?: string;
  readonly finding?: Finding;
}

interface LeftOut {
  readonly name: string;
  readonly because: string;
}

interface Standing {
  readonly statuses: readonly CellStatus[];
  readonly sources: readonly CellSource[];
  readonly resolved: readonly ResolvedCell[];
  readonly findingOf: (fingerprint: string) => Promise<Finding | undefined>;
  /** Without the data, nothing of a single household is to leave either. */
  readonly isWithheld: boolean;
}

/**
 * The cells of a study that a bundle can hold, in the study's order: those that are current and rest on none that is
 * not; and the others, with why.
 */
export async function cellsToBundle({ statuses, sources, resolved, findingOf, isWithheld }: Standing): Promise<{
  readonly cells: readonly BundledSource[];
  readonly leftOut: readonly LeftOut[];
}> {
  const out = new Map<string, string>();
  const cells: BundledSource[] = [];
  for (const one of resolved) {
    const status = statuses.find(({ cellId }) => cellId === one.id);
    const cell = sources.find(({ id }) => id === one.id);
    if (status === undefined || cell === undefined) continue;
    const found = await standingOf(status, findingOf);
    const because = "because" in found ? found.because : isWithheld ? showsOne(cell, found.finding) : undefined;
    if (because !== undefined) out.set(one.name, because);
    else cells.push({ cell, resolved: one, ...("because" in found ? {} : found) });
  }
  leaveOutReaders(cells, out);
  return {
    cells: cells.filter(({ cell }) => !out.has(cell.name)),
    leftOut: [...out].map(([name, because]) => ({ name, because })),
  };
}

async function standingOf(
  { kind, state, fingerprint, because }: CellStatus,
  findingOf: Standing["findingOf"],
): Promise<{ readonly because: string } | Omit<BundledSource, "cell" | "resolved">> {
  if (state !== "current") return { because: `It is ${state}${because === undefined ? "." : `: ${because}`}` };
  // Of a text nothing is stored: its numbers are read from the findings it quotes.
  if (kind === "text") return {};
  const finding = fingerprint === undefined ? undefined : await findingOf(fingerprint);
  return finding === undefined
    ? { because: "It is changing." }
    : { ...(fingerprint !== undefined && { fingerprint }), finding };
}

/** Why a finding tells of a single household or a few, where it does. */
function showsOne(cell: CellSource, finding: FindingOf<CellKind> | undefined): string | undefined {
  if (finding === undefined) return undefined;
  try {
    refuseOneHousehold({ cell, finding });
    return undefined;
  } catch (error) {
    if (error instanceof ServiceError) return error.message;
    throw error;
  }
}

/** What reads a cell that is left out could not be computed again, and is left out with it. */
function leaveOutReaders(cells: readonly BundledSource[], out: Map<string, string>): void {
  for (let before = -1; before !== out.size; ) {
    before = out.size;
    for (const { cell, resolved } of cells) {
      const missing = resolved.reads.find((name) => out.has(name));
      if (missing !== undefined && !out.has(cell.name))
        out.set(cell.name, `It reads ${missing}, which is not in the bundle.`);
    }
  }
}
