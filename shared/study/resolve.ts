import type { CellKind, CellSpecification } from "../schemas/cell.ts";
import type { Problem } from "../schemas/problem.ts";
import type { CellSource, Places } from "./cell-source.ts";
import { columnProblems, type UploadShape } from "./columns.ts";
import { takeOver } from "./like.ts";
import { nearestWord } from "./nearest-word.ts";
import { inOrder } from "./order.ts";
import { checkKeys, parseCell, type StudyCell } from "./parse-cell.ts";
import { quotationProblems } from "./quotation-problems.ts";
import { quotedCells } from "./quotations.ts";
import { sortByReading } from "./topology.ts";
import { LIKE, REFERENCES } from "./vocabulary.ts";
import { aKind, capital, listSome, listWords } from "./words.ts";

/** A cell set beside the others of its study. */
export interface ResolvedCell {
  readonly id: string;
  readonly name: string;
  readonly kind: CellKind | null;
  readonly source: string;
  /** Present when the cell itself is sound; cells it reads may still have problems of their own. */
  readonly specification?: CellSpecification;
  /** Names of the cells it reads, in the order of its keys, whether or not they exist. */
  readonly reads: string[];
  readonly problems: Problem[];
  readonly places: Places;
}

/**
 * Every cell of a study with its references looked up: unknown names and columns with the nearest that
 * exists, cells of the wrong kind, cycles, names given twice, and `like` filled in. In study order.
 */
export function resolveCells(cells: readonly CellSource[], uploads: readonly UploadShape[]): ResolvedCell[] {
  return resolveParsed(
    inOrder(cells).map((cell) => ({ ...cell, parsed: parseCell(cell.kind, cell.source) })),
    uploads,
  );
}

/** The same for cells already read, in the order given. */
export function resolveParsed(cells: readonly StudyCell[], uploads: readonly UploadShape[]): ResolvedCell[] {
  const byName = new Map<string, StudyCell>();
  for (const cell of cells) if (!byName.has(cell.name)) byName.set(cell.name, cell);
  const reading = new Map([...byName].map(([name, cell]) => [name, namesRead(cell, byName)]));
  const { cycles } = sortByReading(reading);

  const sound = cells.map((cell) => {
    const problems = [...cell.parsed.problems, ...nameProblems(cell, byName), ...cycleProblems(cell, byName, cycles)];
    problems.push(...referencesOf(cell).flatMap((reference) => referenceProblems(reference, cell, byName)));
    const completed = problems.length > 0 ? undefined : complete(cell, byName);
    problems.push(...(completed?.problems ?? []));
    return { cell, problems, specification: completed?.specification, reads: readsOf(cell, byName) };
  });
  const specifications = new Map(
    sound.flatMap(({ cell, specification }) => (specification ? [[cell.name, specification] as const] : [])),
  );
  const kinds = new Map([...byName].map(([name, { kind }]) => [name, kind]));
  return sound.map(({ cell, problems, specification, reads }) => {
    const { places, kind } = cell.parsed;
    const columns = specification ? columnProblems({ specification, places, specifications, uploads }) : [];
    const all = [...problems, ...columns, ...quotedWrongly(cell, { kinds, specifications })];
    return {
      id: cell.id,
      name: cell.name,
      kind: kind ?? null,
      source: cell.source,
      ...(all.length === 0 && specification && { specification }),
      reads,
      problems: all,
      places,
    };
  });
}

/** What is wrong with the quotations of a text cell. */
function quotedWrongly({ parsed }: StudyCell, study: Parameters<typeof quotationProblems>[1]): Problem[] {
  const { kind, written, placeInText = () => undefined } = parsed;
  if (kind !== "text" || typeof written.text !== "string") return [];
  return quotationProblems(written.text, study, placeInText);
}

/** The names that stand in a cell, whatever they lead to; a text quotes cells that have numbers. */
function namesRead(cell: StudyCell, byName: ReadonlyMap<string, StudyCell>): string[] {
  const { kind, written } = cell.parsed;
  if (kind !== "text") return referencesOf(cell).map((to) => to.name);
  const text = typeof written.text === "string" ? written.text : "";
  return quotedCells(text).filter((name) => byName.get(name)?.kind !== "text");
}

interface Reference {
  readonly key: string;
  readonly name: string;
  readonly kind: CellKind;
}

function referencesOf({ parsed }: StudyCell): Reference[] {
  if (!parsed.kind) return [];
  const keys: Record<string, CellKind> = {
    ...REFERENCES[parsed.kind],
    ...(parsed.kind === "system" && { [LIKE]: "system" }),
  };
  return Object.entries(keys).flatMap(([key, kind]) => {
    const name = parsed.written[key];
    return typeof name === "string" ? [{ key, name, kind }] : [];
  });
}

/** The cells whose findings it needs; a cell it is only `like` is none of them, the one that names its data is. */
function readsOf(cell: StudyCell, byName: ReadonlyMap<string, StudyCell>): string[] {
  if (cell.parsed.kind === "text") return namesRead(cell, byName);
  const { written } = takeOver(cell, byName);
  const kind = cell.parsed.kind;
  if (!kind) return [];
  return Object.keys(REFERENCES[kind]).flatMap((key) => (typeof written[key] === "string" ? [written[key]] : []));
}

function complete(cell: StudyCell, byName: ReadonlyMap<string, StudyCell>) {
  if (cell.parsed.specification) return { specification: cell.parsed.specification, problems: [] };
  const { written, from } = takeOver(cell, byName);
  const whole = checkKeys("system", written, cell.parsed.places);
  const place = cell.parsed.places.value([LIKE]);
  // What is wrong with a key taken over is told where it was taken over.
  const problems = whole.problems.map((problem) =>
    problem.key && problem.key[0] in cell.parsed.written
      ? problem
      : {
          sentence: `As taken over from ${listWords(from)}: ${problem.sentence}`,
          key: [LIKE],
          ...(place && { place }),
        },
  );
  return { specification: whole.specification, problems };
}

function nameProblems(cell: StudyCell, byName: ReadonlyMap<string, StudyCell>): Problem[] {
  const first = byName.get(cell.name);
  if (!cell.name.trim())
    return [{ sentence: `${capital(aKind(cell.kind))} needs a name, so that others can read it.` }];
  if (first === undefined || first.id === cell.id) return [];
  return [{ sentence: `Another cell is called ${cell.name} already; cells are told apart by their names.` }];
}

function cycleProblems(cell: StudyCell, byName: ReadonlyMap<string, StudyCell>, cycles: string[][]): Problem[] {
  const cycle = cycles.find((names) => names.includes(cell.name));
  if (!cycle || byName.get(cell.name)?.id !== cell.id) return [];
  const start = cycle.indexOf(cell.name);
  const around = [...cycle.slice(start), ...cycle.slice(0, start), cell.name];
  const reference = referencesOf(cell).find(({ name }) => name === around[1]);
  const place = reference && cell.parsed.places.value([reference.key]);
  const sentence =
    cycle.length === 1
      ? `${cell.name} reads itself.`
      : `${around.join(" reads ")}: cells cannot read each other in a circle.`;
  return [{ sentence, ...(reference && { key: [reference.key] }), ...(place && { place }) }];
}

function referenceProblems(reference: Reference, cell: StudyCell, byName: ReadonlyMap<string, StudyCell>): Problem[] {
  const target = byName.get(reference.name);
  const place = cell.parsed.places.value([reference.key]);
  const told = (sentence: string, nearest?: string): Problem[] => [
    { sentence, key: [reference.key], ...(place && { place }), ...(nearest && { nearest }) },
  ];
  const fitting = [...byName.values()].filter((other) => other.kind === reference.kind && other.id !== cell.id);
  if (target) {
    if (target.kind === reference.kind) return [];
    const nearest = fitting.length === 1 ? fitting[0].name : undefined;
    return told(
      `${cell.name} reads ${target.name}, which is ${aKind(target.kind)}; ${reference.key} names ${aKind(reference.kind)}.`,
      nearest,
    );
  }
  const nearest = nearestWord(
    reference.name,
    fitting.map(({ name }) => name),
  );
  const there =
    fitting.length === 0
      ? `The study has no ${reference.kind} cell yet`
      : `The ${reference.kind} cells are ${listSome(fitting.map(({ name }) => name))}`;
  return told(`No cell is called ${reference.name}. ${nearest ? `The nearest is ${nearest}` : there}.`, nearest);
}
