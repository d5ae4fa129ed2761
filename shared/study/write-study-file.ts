import { stringify } from "yaml";
import type { CellSource } from "./cell-source.ts";
import { readDocument } from "./document.ts";

/** A study's cells, in their order, as one file that `parseStudyFile` reads. */
interface Written {
  readonly title: string;
  readonly lede: string;
  readonly cells: readonly Pick<CellSource, "name" | "kind" | "source">[];
}

const MARGIN = "    ";

/** Each source stands in the file as it was written, comments included, moved to the right below its cell's name. */
export function writeStudyFile({ title, lede, cells }: Written): string {
  const head = scalars({ study: title, ...(lede !== "" && { lede }) });
  return `${head}cells:\n${cells.map(cellInFile).join("\n")}`;
}

function cellInFile({ name, kind, source }: Written["cells"][number]): string {
  const key = stringify(name, { lineWidth: 0 }).trimEnd();
  return `  ${key}:\n${indented(scalars({ kind }))}${bodyOf(kind, source)}`;
}

function bodyOf(kind: string, source: string): string {
  // Prose is no map of keys: it stands under one.
  if (kind === "text") return indented(stringify({ text: source }, { lineWidth: 0 }));
  if (isMapOfKeys(source)) return indented(source);
  return indented(source.split("\n").map(commented).join("\n"));
}

/** Words before or after the keys would make the whole file unreadable. */
function isMapOfKeys(source: string): boolean {
  const { value, problems } = readDocument(source);
  const isKeys = value === undefined || value === null || (typeof value === "object" && !Array.isArray(value));
  return problems.length === 0 && isKeys && !/^\s*[{[]|^---|\t/m.test(source);
}

const commented = (line: string) => (line === "" ? "" : `# ${line}`);

const scalars = (values: Record<string, string>) => stringify(values, { lineWidth: 0 });

function indented(text: string): string {
  const lines = text.trimEnd().split("\n");
  if (lines.length === 1 && lines[0] === "") return "";
  return `${lines.map((line) => (line.trim() === "" ? "" : MARGIN + line)).join("\n")}\n`;
}
