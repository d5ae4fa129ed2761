import type { CellSource } from "../../shared/study/cell-source.ts";
import { parseCell } from "../../shared/study/parse-cell.ts";
import { conflict } from "../errors.ts";

interface Author {
  readonly name: string;
  readonly email: string;
}

/** Words that a copy will hold as its owner wrote them, and what they are of. */
interface Written {
  readonly where: string;
  readonly words: string;
}

interface Withheld {
  readonly authors: readonly Author[];
  readonly title: string;
  readonly note: string;
  readonly cells: readonly CellSource[];
}

/**
 * Throws 409 when something that is to be sealed without the authors' names holds one of them, or a text the name of a
 * file: in full, however it is written large or small. A name of one word is not looked for, since it may be any word.
 */
export function refuseWithheldNames({ authors, title, note, cells }: Withheld): void {
  const named = authors.flatMap(({ name, email }) => [...(/\S\s+\S/.test(name.trim()) ? [name] : []), email]);
  const files = cells.flatMap((cell) => {
    const upload = cell.kind === "data" ? parseCell("data", cell.source).written.upload : undefined;
    return typeof upload === "string" && upload !== "" ? [upload] : [];
  });
  const places: Written[] = [
    { where: "The title of the study", words: title },
    { where: "The note", words: note },
    ...cells.map(({ name, source }) => ({ where: name, words: source })),
  ];
  for (const place of places) refuseIn(place, named, "the authors' names are withheld");
  for (const { name, kind, source } of cells) {
    if (kind === "text")
      refuseIn({ where: name, words: source }, files, "names of files are withheld with the authors'");
  }
}

function refuseIn({ where, words }: Written, withheld: readonly string[], because: string): void {
  const plain = plainly(words);
  const found = withheld.find((one) => wholeWords(plainly(one)).test(plain));
  if (found === undefined) return;
  throw conflict(`${where} names ${found}, and ${because}: take the name out, or seal the copy with the names.`);
}

const plainly = (words: string): string => words.normalize("NFC").toLowerCase().replace(/\s+/g, " ").trim();

function wholeWords(words: string): RegExp {
  const literal = words.replace(/[.*+?^${}()|[\]\\]/g, "\\$&");
  return new RegExp(`(?<![\\p{L}\\p{N}])${literal}(?![\\p{L}\\p{N}])`, "u");
}
