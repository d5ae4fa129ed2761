import type { CellKind } from "../../../shared/schemas/cell.ts";
import type { Upload } from "../../../shared/schemas/resources.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { readDocument } from "../../../shared/study/document.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { suggestData } from "../../../shared/study/suggest.ts";
import { latestUploads } from "../../../shared/study/uploads.ts";
import { counted } from "../../../shared/study/words.ts";

const FIRST_NAMES: Readonly<Record<CellKind, string>> = {
  data: "purchases",
  system: "base",
  tests: "laws",
  elasticities: "elasticities",
  slutsky: "matrix",
  "price change": "price change",
  figure: "figure",
  text: "argument",
};

/** A name for a fresh cell that no other has: "matrix", "matrix 2". */
export function freshName(kind: CellKind, cells: readonly Pick<CellSource, "name">[]): string {
  const taken = new Set(cells.map(({ name }) => name));
  const first = FIRST_NAMES[kind];
  for (let number = 2, name = first; ; name = `${first} ${number}`, number += 1) if (!taken.has(name)) return name;
}

const LONGEST_NAME = 60;

/** A name for the copy of a cell that no other has: "base 2" of "base", "base 3" of "base 2". */
export function nameOfCopy(name: string, cells: readonly Pick<CellSource, "name">[]): string {
  const taken = new Set(cells.map((cell) => cell.name));
  const [, stem, number] = /^(.*?)(?: (\d+))?$/.exec(name) ?? ["", name];
  for (let next = Number(number ?? 1) + 1; ; next += 1) {
    const copy = `${stem.slice(0, LONGEST_NAME - 1 - String(next).length)} ${next}`;
    if (!taken.has(copy)) return copy;
  }
}

/** What a fresh cell asks: the last cell of the kind it reads, and the plainest question. */
export function freshSource(kind: CellKind, cells: readonly CellSource[], uploads: readonly Upload[]): string {
  const last = (of: CellKind) => cells.findLast((cell) => cell.kind === of)?.name ?? "";
  if (kind === "system") return `data: ${last("data")}\nform: aids\nimpose: [homogeneity, symmetry]\n`;
  if (kind === "tests") {
    const system = last("system");
    return system || !last("data") ? `system: ${system}\n` : `data: ${last("data")}\n`;
  }
  if (kind === "elasticities") return `system: ${last("system")}\nat: mean\n`;
  if (kind === "slutsky") return `system: ${last("system")}\nat: base point\nform: share\n`;
  if (kind === "price change") return `system: ${last("system")}\nat: mean\nprices: {}\n`;
  if (kind === "figure") {
    const system = last("system");
    return system || !last("data")
      ? `system: ${system}\nshow: engel curves\n`
      : `data: ${last("data")}\nshow: shares by group\n`;
  }
  if (kind === "text") return "";
  const free = latestUploads(uploads).filter(
    ({ name }) => !cells.some(({ kind, source }) => kind === "data" && source.includes(name)),
  );
  const upload = free.at(-1);
  return upload ? suggestData(upload.name, upload.columns) : "";
}

/** Whether a data cell has no upload yet. A text that cannot be read may name one: it is mended, not begun again. */
export function lacksUpload({ kind, source }: CellSource): boolean {
  if (kind !== "data" || readDocument(source).problems.length > 0) return false;
  const { upload } = parseCell("data", source).written;
  return upload === undefined || upload === null || upload === "";
}

const listed = (value: unknown) => (Array.isArray(value) ? value.join(", ") : "");

/** A source in one line, for a page too narrow for the source itself: "aids on survey; log_size, urban". */
export function sourceInALine(kind: string, source: string): string {
  const { written } = parseCell(kind, source);
  const text = (key: string) => (typeof written[key] === "string" ? String(written[key]) : "");
  if (kind === "data") {
    const goods = Object.keys((written.goods as object | null | undefined) ?? {}).length;
    return [text("upload") || "no upload yet", goods > 0 && counted(goods, "good"), text("keep")]
      .filter(Boolean)
      .join(", ");
  }
  if (kind === "system") {
    const head = text("like")
      ? `like ${text("like")}`
      : `${text("form") || "no form yet"} on ${text("data") || "no data yet"}`;
    const group = text("conditional on") && `conditional on ${text("conditional on")}`;
    return [head, group, listed(written.demographics), listed(written.impose)].filter(Boolean).join("; ");
  }
  if (kind === "tests") {
    return [text("system") || text("data") || "no system yet", listed(written.of)].filter(Boolean).join("; ");
  }
  if (kind === "elasticities") return elasticitiesInALine(written, text);
  if (kind === "slutsky") {
    const at = typeof written.at === "object" && written.at ? inWords(written.at) : text("at") || "base point";
    return `${text("system") || "no system yet"} at ${at}; ${text("form") || "share"} form`;
  }
  if (kind === "price change") return priceChangeInALine(written, text);
  if (kind === "figure") {
    const of = text("system") || text("data") || text("price change") || "no cell yet";
    return [`${text("show") || "nothing shown yet"} of ${of}`, listed(written.goods)].filter(Boolean).join("; ");
  }
  return source.split("\n").find((line) => line.trim() !== "") ?? "nothing written yet";
}

function elasticitiesInALine(written: Record<string, unknown>, text: (key: string) => string): string {
  const { at, groups } = written;
  const isRows = text("over") === "rows";
  const by = typeof groups === "object" && groups && "of" in groups ? ` by ${groups.of}` : "";
  const where = typeof at === "object" && at ? inWords(at) : text("at") || "mean";
  const rest = by || isRows ? `${by}${isRows ? " over rows" : " at means"}` : ` at ${where}`;
  const within = text("within") && ` as ${text("as")} within ${text("within")}`;
  return `${text("system") || "no system yet"}${within}${rest}`;
}

function priceChangeInALine(written: Record<string, unknown>, text: (key: string) => string): string {
  const { prices } = written;
  const goods = typeof prices === "object" && prices ? Object.keys(prices) : [];
  return [text("system") || "no system yet", goods.length === 0 ? "no price changes yet" : goods.join(", ")].join("; ");
}

function inWords(at: object): string {
  if ("row" in at) return `row ${at.row}`;
  if ("x" in at && !("prices" in at)) return `x: ${at.x}`;
  return "a point of one's own";
}
