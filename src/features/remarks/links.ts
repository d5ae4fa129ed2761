export interface TextPart {
  readonly text: string;
  /** Set where the part is an address. */
  readonly address?: string;
}

const ADDRESS = /https?:\/\/[^\s<>"'`]+/giu;
/** What ends a sentence after an address, and is not of it. */
const AFTER = /[.,;:!?…»”’]+$/u;

/** Plain text in parts: web addresses, and what stands between them. Nothing else in it is taken for anything. */
export function partsOf(text: string): TextPart[] {
  const parts: TextPart[] = [];
  let from = 0;
  for (const match of text.matchAll(ADDRESS)) {
    const found = withoutClosing(match[0].replace(AFTER, ""));
    if (!isAddress(found)) continue;
    if (match.index > from) parts.push({ text: text.slice(from, match.index) });
    parts.push({ text: found, address: found });
    from = match.index + found.length;
  }
  if (from < text.length) parts.push({ text: text.slice(from) });
  return parts;
}

/** A closing parenthesis belongs to the sentence unless the address opened it. */
function withoutClosing(found: string): string {
  const opened = found.split("(").length;
  return found.endsWith(")") && found.split(")").length > opened ? found.slice(0, -1).replace(AFTER, "") : found;
}

function isAddress(text: string): boolean {
  return URL.canParse(text) && /^https?:$/.test(new URL(text).protocol);
}
