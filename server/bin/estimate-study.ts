import { readdir } from "node:fs/promises";
import { basename, dirname, resolve } from "node:path";
import type { Finding } from "../../shared/schemas/cell.ts";
import type { Problem } from "../../shared/schemas/problem.ts";
import type { UploadShape } from "../../shared/study/columns.ts";
import { fingerprintCells } from "../../shared/study/fingerprints.ts";
import { nearestWord } from "../../shared/study/nearest-word.ts";
import { type ResolvedCell, resolveParsed } from "../../shared/study/resolve.ts";
import { placed } from "../../shared/study/states.ts";
import { parseStudyFile } from "../../shared/study/study-file.ts";
import { sortByReading } from "../../shared/study/topology.ts";
import {
  runData,
  runElasticities,
  runFigure,
  runPriceChange,
  runSlutsky,
  runSystem,
  runTests,
  runText,
} from "../engine/cells/index.ts";
import type { PreparedData, UploadTable } from "../engine/columns/prepared-data.ts";
import { readTable } from "../engine/columns/read-table.ts";
import { Refusal } from "../engine/refusal.ts";
import type { RunControl } from "../engine/run.ts";
import { withFileOnDisk } from "./file-on-disk.ts";

/** Something to mend, with the cell and key it is about: "base.form"; none for the file as a whole. */
export interface Complaint extends Pick<Problem, "sentence" | "place"> {
  readonly key: string;
}

export interface EstimatedStudy {
  /** By cell name, in the order of the file. */
  readonly findings: Readonly<Record<string, Finding>>;
  readonly complaints: readonly Complaint[];
}

interface Options {
  /** Names of the cells wanted; all when none are named. */
  readonly only?: readonly string[];
  /** Sheets to read of workbooks, by the name their data cells write; the first that is not empty, unless said. */
  readonly sheets?: ReadonlyMap<string, string>;
  readonly control: RunControl;
}

/** The cells of a study file, each computed by the engine the workspace uses; data paths are relative to the file. */
export async function estimateStudy(
  text: string,
  path: string,
  { only = [], sheets, control }: Options,
): Promise<EstimatedStudy> {
  const file = parseStudyFile(text);
  const unknown = only.filter((name) => !file.cells.some((cell) => cell.name === name));
  const outside = [...file.problems, ...unknown.map((name) => noCell(name, file.cells))];
  if (outside.length > 0) return { findings: {}, complaints: outside.map((problem) => complaintOf("", problem)) };

  const read = await readUploads(
    file.cells.map(({ parsed }) => parsed.written.upload),
    path,
    { sheets, control },
  );
  const resolved = resolveParsed(file.cells, read.shapes);
  const fingerprints = fingerprintCells(resolved, read.shapes);
  const wanted = wantedAmong(resolved, only);
  const complaints = wanted.flatMap((cell) => {
    const unread = cell.kind === "data" ? read.problems.get(uploadOf(cell.id, file.cells)) : undefined;
    const problems = unread ? placed(unread, cell.places) : cell.problems;
    return problems.map((problem) => complaintOf(cell.name, problem));
  });
  if (complaints.length > 0) return { findings: {}, complaints };
  const inFile = file.cells.map(({ name }) => name);
  return runCells(wanted, read.tables, { only, inFile, fingerprints }, control);
}

type Cells = ReturnType<typeof parseStudyFile>["cells"];

function noCell(name: string, cells: Cells): Problem {
  const names = cells.map((cell) => cell.name);
  const nearest = nearestWord(name, names);
  return {
    sentence: `No cell is called ${name}. ${nearest ? `The nearest is ${nearest}` : `There are ${names.join(", ")}`}.`,
  };
}

function uploadOf(cellId: string, cells: Cells): string {
  return String(cells.find(({ id }) => id === cellId)?.parsed.written.upload);
}

function complaintOf(cell: string, { key = [], sentence, place }: Problem): Complaint {
  return { key: [cell, ...key].filter((step) => step !== "").join("."), sentence, ...(place && { place }) };
}

/** The files that data cells name, each read once. */
async function readUploads(
  names: readonly unknown[],
  path: string,
  { sheets, control }: Pick<Options, "sheets" | "control">,
) {
  const tables = new Map<string, UploadTable>();
  const shapes: UploadShape[] = [];
  const problems = new Map<string, Problem[]>();
  for (const name of new Set(names.filter((one) => typeof one === "string"))) {
    try {
      const whole = resolve(dirname(path), name);
      const { table, columns } = await withFileOnDisk(whole, (file) =>
        readTable(file, name, { sheet: sheets?.get(name), control }),
      );
      tables.set(name, table);
      shapes.push({ name, sha256: table.sha256, rows: table.rows, columns });
    } catch (error) {
      problems.set(name, await problemsOfReading(error, name, path));
    }
  }
  return { tables, shapes, problems };
}

async function problemsOfReading(error: unknown, name: string, path: string): Promise<Problem[]> {
  const key = ["upload"];
  if (error instanceof Refusal) {
    return error.problems.map(({ sentence }) => ({ sentence: `${name}: ${sentence}`, key }));
  }
  const { code } = error as NodeJS.ErrnoException;
  if (code !== "ENOENT") {
    if (code === undefined) throw error;
    return [{ sentence: `${name} cannot be read (${code}).`, key }];
  }
  const beside = await readdir(dirname(resolve(dirname(path), name))).catch(() => []);
  const nearest = nearestWord(basename(name), beside);
  return [
    { sentence: `There is no file ${name} beside the study file.${nearest ? ` The nearest is ${nearest}.` : ""}`, key },
  ];
}

/** The cells named and all they read, in an order in which each comes after what it reads. */
function wantedAmong(cells: readonly ResolvedCell[], only: readonly string[]): ResolvedCell[] {
  const byName = new Map(cells.map((cell) => [cell.name, cell]));
  const wanted = new Set<string>();
  const want = (name: string) => {
    const cell = byName.get(name);
    if (!cell || wanted.has(name)) return;
    wanted.add(name);
    cell.reads.forEach(want);
  };
  (only.length > 0 ? only : [...byName.keys()]).forEach(want);
  const { order, stuck } = sortByReading(new Map(cells.map(({ name, reads }) => [name, reads])));
  return [...order, ...stuck].filter((name) => wanted.has(name)).flatMap((name) => byName.get(name) ?? []);
}

interface Asked {
  readonly only: readonly string[];
  readonly inFile: readonly string[];
  readonly fingerprints: ReadonlyMap<string, string>;
}

function runCells(
  cells: readonly ResolvedCell[],
  tables: ReadonlyMap<string, UploadTable>,
  { only, inFile, fingerprints }: Asked,
  control: RunControl,
): EstimatedStudy {
  const prepared = new Map<string, PreparedData>();
  const found = new Map<string, Finding>();
  const complaints: Complaint[] = [];
  const specificationOf = (name: string) => cells.find((cell) => cell.name === name)?.specification;
  for (const cell of cells) {
    // What reads a cell that failed has nothing to say of its own.
    if (cell.reads.some((name) => !found.has(name))) continue;
    try {
      found.set(cell.name, runCell(cell, prepared, found, tables, { control, specificationOf, fingerprints }));
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      complaints.push(...placed(error.problems, cell.places).map((problem) => complaintOf(cell.name, problem)));
    }
  }
  if (complaints.length > 0) return { findings: {}, complaints };
  const asked = only.length > 0 ? only : inFile;
  return { findings: Object.fromEntries(asked.map((name) => [name, found.get(name)!])), complaints };
}

interface Running {
  readonly control: RunControl;
  readonly specificationOf: (name: string) => ResolvedCell["specification"];
  /** By name: of a file, a cell's id is its name. */
  readonly fingerprints: ReadonlyMap<string, string>;
}

function runCell(
  { name, specification }: ResolvedCell,
  prepared: Map<string, PreparedData>,
  found: ReadonlyMap<string, Finding>,
  tables: ReadonlyMap<string, UploadTable>,
  { control, specificationOf, fingerprints }: Running,
): Finding {
  if (specification?.kind === "data") {
    const data = runData(specification, tables.get(specification.upload)!, control);
    prepared.set(name, data);
    return data.finding;
  }
  if (specification?.kind === "text") {
    const quoted = [...found].map(
      ([cell, finding]) => [cell, { finding, fingerprint: fingerprints.get(cell) }] as const,
    );
    return runText(specification, new Map(quoted));
  }
  // The rows beneath a system go with it under its own name.
  const below = readOf(specification);
  const data = prepared.get(below)!;
  prepared.set(name, data);
  if (specification?.kind === "system") return runSystem(specification, data, control);
  const system = found.get(below);
  if (specification?.kind === "tests") {
    const asked = specificationOf(below);
    const tested = asked?.kind === "system" && system?.kind === "system" && { specification: asked, finding: system };
    return runTests(specification, data, tested || undefined, control);
  }
  if (specification?.kind === "figure") {
    const isBasis = system?.kind === "system" || system?.kind === "price change";
    return runFigure(specification, isBasis ? system : undefined, data, control);
  }
  if (system?.kind !== "system") throw new Error(`${name} has no specification`);
  if (specification?.kind === "elasticities") {
    const { within = "" } = specification;
    const finding = found.get(within);
    const broader = finding?.kind === "system" ? { finding, data: prepared.get(within)! } : undefined;
    return runElasticities(specification, system, data, control, broader);
  }
  if (specification?.kind === "price change") return runPriceChange(specification, system, data, control);
  if (specification?.kind !== "slutsky") throw new Error(`${name} has no specification`);
  return runSlutsky(specification, system, data, control);
}

/** The one cell a cell reads. */
function readOf(specification: ResolvedCell["specification"]): string {
  if (!specification || specification.kind === "data") return "";
  if ("system" in specification && specification.system !== undefined) return specification.system;
  if (specification.kind === "figure" && specification["price change"]) return specification["price change"];
  return "data" in specification ? (specification.data ?? "") : "";
}
