import { listed } from "./phrases.ts";
import { REFERENCES, type Reference, type ReferenceKey } from "./references.ts";

const entry = (key: ReferenceKey): Reference => REFERENCES[key];

const families = (key: ReferenceKey): string => listed(entry(key).authors.map(([family]) => family));

/** "Banks, Blundell and Lewbel 1997": within parentheses. */
export function cited(key: ReferenceKey): string {
  return `${families(key)} ${entry(key).year}`;
}

/** "Banks, Blundell and Lewbel (1997)": in the sentence itself. */
export function citedInText(key: ReferenceKey): string {
  return `${families(key)} (${entry(key).year})`;
}

const sortKey = (key: ReferenceKey): string =>
  `${entry(key)
    .authors.map(([family]) => family)
    .join(" ")} ${entry(key).year}`;

/** Once each, by first author and year. */
export function sortedReferences(keys: Iterable<ReferenceKey>): ReferenceKey[] {
  return [...new Set(keys)].sort((a, b) => sortKey(a).localeCompare(sortKey(b), "en"));
}

/** "Banks, J., Blundell, R. and Lewbel, A. (1997). Quadratic Engel curves … Review of …, 79(4), 527–539." */
export function referenceInWords(key: ReferenceKey): string {
  const { authors, year, title, journal, volume, issue, pages, school } = entry(key);
  const names = listed(authors.map(([family, initials]) => `${family}, ${initials}`));
  const end = /[?!]$/.test(title) ? "" : ".";
  if (journal === undefined) return `${names} (${year}). ${title}${end} Doctoral thesis, ${school}.`;
  return `${names} (${year}). ${title}${end} ${journal} ${volume}(${issue}), ${pages?.join("–")}.`;
}

/** One entry of a BibTeX file. Capitals that a style would lower stand in braces. */
export function bibtexEntry(key: ReferenceKey): string {
  const { authors, year, title, journal, volume, issue, pages, school } = entry(key);
  const fields: [string, string][] = [
    ["author", authors.map(([family, initials]) => `${family}, ${initials}`).join(" and ")],
    ["title", title.replace(/(?<=.)\b[A-Z][A-Za-z]*/g, "{$&}")],
    ...(journal === undefined
      ? ([["school", school ?? ""]] as [string, string][])
      : ([
          ["journal", journal.replace("&", "\\&")],
          ["volume", String(volume)],
          ["number", String(issue)],
          ["pages", pages?.join("--") ?? ""],
        ] as [string, string][])),
    ["year", String(year)],
  ];
  const lines = fields.map(([name, value]) => `  ${name} = {${latin(value)}}`);
  return `@${journal === undefined ? "phdthesis" : "article"}{${key},\n${lines.join(",\n")}\n}`;
}

/** Letters with marks as every BibTeX reads them. */
const latin = (text: string): string => text.replaceAll("ü", '{\\"u}').replaceAll("ö", '{\\"o}');

export function bibtex(keys: Iterable<ReferenceKey>): string {
  return `${sortedReferences(keys).map(bibtexEntry).join("\n\n")}\n`;
}
