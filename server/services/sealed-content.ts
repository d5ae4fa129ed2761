import type { FindingOf } from "../../shared/schemas/cell.ts";
import type { DataFinding } from "../../shared/schemas/data.ts";
import type {
  AlsoKind,
  SealedAlso,
  SealedContent,
  SealedMethods,
  SealedSlutsky,
} from "../../shared/schemas/referee-copy.ts";
import type { SlutskyFinding } from "../../shared/schemas/slutsky.ts";
import type { SystemFinding } from "../../shared/schemas/system.ts";
import type { TestsFinding } from "../../shared/schemas/tests.ts";
import type { SealedText } from "../../shared/schemas/text.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import { setKey } from "../../shared/study/edit.ts";
import { withoutDraws } from "../../shared/study/without-draws.ts";

/** The matrix and the two cells it rests on, sources and findings. */
export interface SealedCells {
  readonly matrix: { readonly cell: CellSource; readonly finding: SlutskyFinding };
  readonly system: { readonly cell: CellSource; readonly finding: SystemFinding };
  readonly data: { readonly cell: CellSource; readonly finding: DataFinding };
  /** Further findings, in the order asked for. */
  readonly also?: readonly AlsoCell[];
  /** What those rest on besides the three above and themselves: their sources go along. */
  readonly read?: readonly CellSource[];
  /** Drafted from the systems among them, where that was asked for. */
  readonly methods?: readonly SealedMethods[];
}

/** Every cell whose source goes into a copy: what the matrix rests on, what else is read, what is sealed beside it. */
export function sourcesSealed({ matrix, system, data, also = [], read = [] }: SealedCells): CellSource[] {
  return [data.cell, system.cell, matrix.cell, ...read, ...also.map(({ cell }) => cell)];
}

export interface AlsoCell {
  readonly cell: CellSource;
  readonly finding: FindingOf<Exclude<AlsoKind, "text">> | SealedText;
}

interface About {
  readonly program: string;
  readonly title: string;
  readonly authors: readonly string[] | undefined;
  readonly note: string;
  readonly sealedAt: Date;
}

/**
 * What a referee reads, named field by field so that nothing comes along by itself. Of the
 * households it has sums only: no row's number, no row's values, no place of a row in the file.
 */
export function sealedContentOf(about: About, sealed: SealedCells): SealedContent {
  const { matrix, system, data, also = [], methods = [] } = sealed;
  const { title, authors, program, note, sealedAt } = about;
  return {
    format: "tangency referee copy 1",
    program,
    study: authors === undefined ? { title } : { title, authors: [...authors] },
    note,
    sealedAt: sealedAt.toISOString(),
    cells: {
      sources: sourcesSealed(sealed)
        .map((cell) => (authors === undefined && cell.kind === "data" ? withoutFileName(cell) : cell))
        .map(({ name, kind, source }) => ({ name, kind, source })),
      matrix: matrix.cell.name,
      system: system.cell.name,
      data: data.cell.name,
    },
    slutsky: matrixOf(matrix.finding),
    system: withoutDraws(withoutRows(system.finding)),
    ...(also.length > 0 && { also: also.map(alsoOf) }),
    ...(methods.length > 0 && { methods: methods.map(methodsOf) }),
    accounting: accountingOf(data.finding),
    data: {
      meanTotal: data.finding.meanTotal,
      weighted: data.finding.weighted,
      fingerprint: data.finding.dataFingerprint,
    },
  };
}

function alsoOf({ cell: { name }, finding }: AlsoCell): SealedAlso {
  switch (finding.kind) {
    case "system":
      return { kind: "system", name, finding: withoutDraws(withoutRows(finding)) };
    case "tests":
      return { kind: "tests", name, finding: withoutCycle(finding) };
    case "elasticities":
      return { kind: "elasticities", name, finding };
    case "slutsky":
      return { kind: "slutsky", name, finding: matrixOf(finding) };
    case "text":
      return { kind: "text", name, finding };
  }
}

function methodsOf({ system, text, references, bibtex }: SealedMethods): SealedMethods {
  return { system, text, references: [...references], bibtex };
}

/** Rows that contradict one another are counted, not listed. */
function withoutCycle(finding: TestsFinding): TestsFinding {
  const { revealed } = finding;
  if (revealed === undefined || "absent" in revealed) return finding;
  return { ...finding, revealed: { ...revealed, cycle: [] } };
}

/** The rows of the linear expenditure system without supernumerary expenditure are counted, not listed. */
function withoutRows(finding: SystemFinding): SystemFinding {
  const { expenditure } = finding;
  if (expenditure === undefined) return finding;
  const withoutSupernumerary = { ...expenditure.withoutSupernumerary, firstRows: [] };
  return { ...finding, expenditure: { ...expenditure, withoutSupernumerary } };
}

/** Files are often called after whoever made them. */
function withoutFileName(cell: CellSource): CellSource {
  return { ...cell, source: setKey(cell.source, ["upload"], "withheld") };
}

function matrixOf(finding: SlutskyFinding): SealedSlutsky {
  const {
    kind,
    dataFingerprint,
    fitted,
    form,
    pointName,
    point,
    priceScale,
    totalScale,
    at,
    tests,
    caveats,
    conditionalOn,
    sample,
  } = finding;
  const sealed = { kind, dataFingerprint, fitted, form, pointName, point, priceScale, totalScale, at, tests };
  return {
    ...sealed,
    ...(caveats && { caveats }),
    ...(conditionalOn !== undefined && { conditionalOn }),
    ...(sample && { sample }),
  };
}

function accountingOf({ accounting }: DataFinding): SealedContent["accounting"] {
  const leftOut = accounting.leftOut.map(({ reason, label, count }) => ({ reason, label, count }));
  return { uploaded: accounting.uploaded, leftOut, used: accounting.used };
}
