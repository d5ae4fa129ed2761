/** As much of a cell as remarks on it need. */
export interface RemarkedCell {
  readonly id: string;
  readonly name: string;
  readonly kind: string;
  readonly source: string;
}

/** Keys at the left edge of a source; prose has none. */
const KEY = /^([\p{L}_][\p{L}\p{N}_ -]*):(?:\s|$)/gmu;

/** What can be spoken of in a cell: the places of its finding that are on the page, then the keys of its source. */
export function placesOf(band: Element | null, { kind, source }: RemarkedCell): string[] {
  const marks = [...(band?.querySelectorAll("[data-anchor]") ?? [])].map((mark) => mark.getAttribute("data-anchor"));
  const keys = kind === "text" ? [] : [...source.matchAll(KEY)].map(([, key]) => `key ${key}`);
  return [...new Set([...marks.filter((mark) => mark !== null && !mark.startsWith("key ")), ...keys])] as string[];
}
