import { Refusal } from "../../refusal.ts";
import { readTags } from "./xml-tags.ts";
import type { ZipEntries } from "./zip-entries.ts";

export interface WorkbookSheet {
  readonly name: string;
  readonly part: string;
  readonly hidden: boolean;
}

export interface WorkbookParts {
  /** Sheets of cells, in their order; sheets of a chart alone are none. */
  readonly sheets: readonly WorkbookSheet[];
  /** Days count from 1904 instead of 1900. */
  readonly from1904: boolean;
  /** Whether a cell of a style shows a day or a moment, by the number of the style. */
  readonly isDate: readonly boolean[];
  readonly texts: readonly string[];
}

const BOOK = "xl/workbook.xml";
const MOST_TEXT = 256 * 1024 ** 2;
/** Formats that show days or moments without being spelled out in the file. */
const DATE_FORMATS: ReadonlySet<number> = new Set([
  14, 15, 16, 17, 22, 27, 28, 29, 30, 31, 36, 50, 51, 52, 53, 54, 57, 58,
]);

/** What a workbook keeps once for all its sheets. */
export async function readParts(zip: ZipEntries): Promise<WorkbookParts> {
  if (!zip.has(BOOK)) throw notAWorkbook(zip);
  const { sheets, from1904 } = await readBook(zip);
  if (sheets.length === 0) throw new Refusal("The workbook has no sheet with cells.");
  return { sheets, from1904, isDate: await readStyles(zip), texts: await readTexts(zip) };
}

function notAWorkbook(zip: ZipEntries): Refusal {
  if (zip.has("xl/workbook.bin")) return new Refusal("The file is a binary workbook; save it as XLSX.");
  if (zip.has("content.xml")) return new Refusal("The file is an OpenDocument spreadsheet; save it as XLSX or CSV.");
  const [first = "nothing"] = zip.names();
  return new Refusal(
    `The file is a zip archive and not a workbook: it holds ${first}. Unpack it, and upload the table itself.`,
  );
}

async function readBook(zip: ZipEntries) {
  const targets = new Map<string, string>();
  const relations = "xl/_rels/workbook.xml.rels";
  if (zip.has(relations)) {
    await readTags(zip.read(relations), relations, {
      open(name, { Id, Target, Type = "" }) {
        if (name === "Relationship" && Id && Target && Type.endsWith("/worksheet")) targets.set(Id, partOf(Target));
      },
    });
  }
  const sheets: WorkbookSheet[] = [];
  let from1904 = false;
  await readTags(zip.read(BOOK), BOOK, {
    open(tag, attributes) {
      if (tag === "workbookPr") from1904 = isTrue(attributes.date1904);
      if (tag !== "sheet") return;
      const id = Object.entries(attributes).find(([key]) => key === "id" || key.endsWith(":id"))?.[1];
      const part = targets.get(id ?? "");
      const { name = "", state = "visible" } = attributes;
      if (part !== undefined) sheets.push({ name, part, hidden: state !== "visible" });
    },
  });
  return { sheets, from1904 };
}

const isTrue = (value: string | undefined) => value === "1" || value === "true";
const partOf = (target: string) => (target.startsWith("/") ? target.slice(1) : `xl/${target.replace(/^\.\//, "")}`);

async function readStyles(zip: ZipEntries): Promise<boolean[]> {
  const part = "xl/styles.xml";
  if (!zip.has(part)) return [];
  const spelled = new Map<number, boolean>();
  const isDate: boolean[] = [];
  let inCells = false;
  await readTags(zip.read(part), part, {
    open(name, { numFmtId = "0", formatCode = "" }) {
      if (name === "numFmt") spelled.set(Number(numFmtId), showsDate(formatCode));
      if (name === "cellXfs") inCells = true;
      if (name === "xf" && inCells) {
        const format = Number(numFmtId);
        isDate.push(spelled.get(format) ?? DATE_FORMATS.has(format));
      }
    },
    close(name) {
      if (name === "cellXfs") inCells = false;
    },
  });
  return isDate;
}

/** A format shows a day where it has y or d, or a month, outside quotes, brackets and escapes. */
export function showsDate(format: string): boolean {
  const bare = format.replace(/"[^"]*"|\[[^\]]*\]|\\.|_.|\*./g, "");
  const [positive] = bare.split(";");
  return /[yd]/i.test(positive) || (/m/i.test(positive) && !/[hs0#]/i.test(positive));
}

async function readTexts(zip: ZipEntries): Promise<string[]> {
  const part = "xl/sharedStrings.xml";
  if (!zip.has(part)) return [];
  const texts: string[] = [];
  const text = new TextOfRuns();
  let kept = 0;
  await readTags(zip.read(part), part, {
    open: (name) => text.open(name),
    text: (words) => text.add(words),
    close(name) {
      text.close(name);
      if (name !== "si") return;
      const whole = text.take();
      kept += whole.length;
      if (kept > MOST_TEXT)
        throw new Refusal(`The workbook's texts have more than ${MOST_TEXT / 1024 ** 2} million signs.`);
      texts.push(whole);
    },
  });
  return texts;
}

/** A text in runs of one look each; how it is pronounced, where a file says that, is no part of it. */
export class TextOfRuns {
  private words = "";
  private inText = false;
  private pronounced = 0;

  open(name: string): void {
    if (name === "t") this.inText = true;
    if (name === "rPh") this.pronounced++;
  }

  add(words: string): void {
    if (this.inText && this.pronounced === 0) this.words += words;
  }

  close(name: string): void {
    if (name === "t") this.inText = false;
    if (name === "rPh") this.pronounced--;
  }

  take(): string {
    const words = this.words;
    this.words = "";
    return words.replace(/_x([0-9A-Fa-f]{4})_/g, (_, code: string) => String.fromCharCode(Number.parseInt(code, 16)));
  }
}
