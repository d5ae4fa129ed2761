import type { Problem } from "../schemas/problem.ts";
import type { CellStatus, Progress } from "../schemas/status.ts";
import type { Places } from "./cell-source.ts";
import { describeChanges } from "./changes.ts";
import { nameOf } from "./issues.ts";
import type { ResolvedCell } from "./resolve.ts";
import { LIKE } from "./vocabulary.ts";
import { listWords } from "./words.ts";

export type LastFinding = NonNullable<CellStatus["last"]>;

/** Everything the states of a study's cells follow from. Nothing else is asked, nothing is changed. */
export interface StateParts {
  readonly cells: readonly ResolvedCell[];
  /** By cell id; absent where the cell, or one it reads, has problems. */
  readonly fingerprints: ReadonlyMap<string, string>;
  /** Fingerprints under which a finding is stored. */
  readonly found: ReadonlySet<string>;
  /** By fingerprint: being computed. */
  readonly running: ReadonlyMap<string, Progress>;
  /** By fingerprint: the engine said no. */
  readonly failed: ReadonlyMap<string, readonly Problem[]>;
  /** By fingerprint: stopped before it was done, and why, in words. */
  readonly stopped: ReadonlyMap<string, string>;
  /** By cell id: the finding it last had, and the source that asked for it. */
  readonly last: ReadonlyMap<string, LastFinding>;
  /** By cell id: what stands in the place of the upload its last finding rested on: "version 2 of purchases.csv". */
  readonly replaced?: ReadonlyMap<string, string>;
  /** By cell id: how long an estimation that waits to be asked for would take. */
  readonly aboutMs: ReadonlyMap<string, number>;
}

/** The state of every cell, in study order, with the reason in words. */
export function cellStatuses(parts: StateParts): CellStatus[] {
  const states = new Map<string, CellStatus>();
  const byName = new Map<string, ResolvedCell>();
  for (const cell of parts.cells) if (!byName.has(cell.name)) byName.set(cell.name, cell);
  const statusOf = (cell: ResolvedCell): CellStatus => {
    const known = states.get(cell.id);
    if (known) return known;
    // A circle of cells has problems in every member, so that none of them asks for another.
    const upstream = cell.problems.length > 0 ? [] : cell.reads.flatMap((name) => byName.get(name) ?? []).map(statusOf);
    const status = stateOf(cell, upstream, parts);
    states.set(cell.id, status);
    return status;
  };
  return parts.cells.map(statusOf);
}

function stateOf(cell: ResolvedCell, upstream: readonly CellStatus[], parts: StateParts): CellStatus {
  const fingerprint = parts.fingerprints.get(cell.id);
  const last = parts.last.get(cell.id);
  const status = {
    cellId: cell.id,
    name: cell.name,
    kind: cell.kind,
    reads: cell.reads,
    ...(fingerprint && { fingerprint }),
    ...(last && { last }),
    problems: [] as Problem[],
  };
  if (cell.problems.length > 0) {
    return {
      ...status,
      state: "failed",
      because: `at ${whereOf(cell.problems[0])}, before estimation`,
      problems: cell.problems,
    };
  }
  const waiting = last ? ("out of date" as const) : ("draft" as const);
  if (cell.kind === "text") return { ...status, ...writtenState(cell, upstream) };
  if (!fingerprint) return { ...status, state: waiting, because: waitsFor(upstream) ?? "waits for a cell it reads" };
  const progress = parts.running.get(fingerprint);
  if (progress) return { ...status, state: "estimating", progress };
  if (parts.found.has(fingerprint)) return { ...status, state: "current" };
  const failed = parts.failed.get(fingerprint);
  if (failed) return { ...status, state: "failed", because: failureOf(failed), problems: placed(failed, cell.places) };
  const aboutMs = parts.aboutMs.get(cell.id);
  const because =
    parts.stopped.get(fingerprint) ?? (last && changeOf(cell, last, upstream, parts.replaced)) ?? waitsFor(upstream);
  return { ...status, state: waiting, ...(because && { because }), ...(aboutMs !== undefined && { aboutMs }) };
}

/** Of a text, which is not computed but read: as current as what it quotes. */
function writtenState(
  { source }: ResolvedCell,
  upstream: readonly CellStatus[],
): Pick<CellStatus, "state" | "because"> {
  if (source.trim() === "") return { state: "draft", because: "nothing is written yet" };
  const behind = upstream.filter(({ state }) => state !== "current").map(({ name }) => name);
  if (behind.length === 0) return { state: "current" };
  return { state: "out of date", because: `${listWords(behind)} ${behind.length === 1 ? "is" : "are"} not current` };
}

/** "demographics", "price of brand1", "line 3". */
function whereOf({ key, place }: Problem): string {
  const name = key ? nameOf(key.filter((step) => !/^\d+$/.test(step))) : "";
  return name || (place ? `line ${place.line}` : "its name");
}

function failureOf(problems: readonly Problem[]): string {
  const [first] = problems;
  if (first?.key) return `at ${whereOf(first)}`;
  if (first?.row !== undefined) return `at row ${first.row}`;
  return "while estimating";
}

/** Why a cell cannot be computed although nothing is wrong with itself. */
function waitsFor(upstream: readonly CellStatus[]): string | undefined {
  const behind = upstream.find(({ state }) => state !== "current");
  if (!behind) return undefined;
  if (behind.state === "failed") {
    return `waits for ${behind.name}, which failed${behind.because ? ` ${behind.because}` : ""}`;
  }
  if (behind.state === "estimating") return `waits for ${behind.name}`;
  return behind.kind === "system" ? `waits for ${behind.name} to be estimated` : `waits for ${behind.name}`;
}

function changeOf(
  cell: ResolvedCell,
  last: LastFinding,
  upstream: readonly CellStatus[],
  replaced: StateParts["replaced"],
): string {
  const own = describeChanges(last.source, cell.source);
  if (own) return own;
  const upload = replaced?.get(cell.id);
  if (upload !== undefined) return `upload replaced by ${upload}`;
  const notCurrent = upstream.filter(({ state }) => state !== "current").map(({ name }) => name);
  const above = notCurrent.length > 0 ? notCurrent : cell.reads;
  if (new RegExp(`^["']?${LIKE}["']?\\s*:`, "m").test(cell.source))
    return "what it takes over, or what it reads, changed";
  if (above.length > 0) return `${listWords(above)} changed`;
  return "its upload changed";
}

/** The engine names keys; their places are the source's. */
export function placed(problems: readonly Problem[], places: Places): Problem[] {
  return problems.map((problem) => {
    if (problem.place || !problem.key) return problem;
    for (let length = problem.key.length; length > 0; length--) {
      const path = problem.key.slice(0, length);
      const place = places.value(path) ?? places.key(path);
      if (place) return { ...problem, place };
    }
    return problem;
  });
}
