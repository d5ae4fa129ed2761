import { Refusal } from "../refusal.ts";

export type Separator = "," | ";" | "\t";

const QUOTE = 0x22;
const LINE_FEED = 0x0a;
const CARRIAGE_RETURN = 0x0d;
/** In the order in which a tie is decided: the rarer a sign is inside names, the more it says. */
const SEPARATORS: readonly Separator[] = ["\t", ";", ","];

/** Finds where the first line that is not empty ends outside quotes, piece by piece. */
export class HeaderScan {
  /** Bytes before the header's line end; −1 while it has not arrived. */
  end = -1;
  private scanned = 0;
  private quoted = false;
  private begun = false;

  feed(piece: Uint8Array): void {
    for (let at = 0; at < piece.length && this.end < 0; at++) {
      const byte = piece[at];
      const breaks = byte === LINE_FEED || byte === CARRIAGE_RETURN;
      if (breaks && this.begun && !this.quoted) this.end = this.scanned + at;
      if (byte === QUOTE) this.quoted = !this.quoted;
      if (!breaks) this.begun = true;
    }
    this.scanned += piece.length;
  }
}

/**
 * The sign that separates the cells of the header: of comma, semicolon and tab the one that occurs most
 * often outside quotes. A header without any of them has one column, and one column is no table.
 */
export function detectSeparator(header: Uint8Array): Separator {
  const counts = new Map<number, number>();
  let quoted = false;
  for (const byte of header) {
    if (byte === QUOTE) quoted = !quoted;
    else if (!quoted) counts.set(byte, (counts.get(byte) ?? 0) + 1);
  }
  const occurrences = (separator: Separator) => counts.get(separator.charCodeAt(0)) ?? 0;
  const [best] = [...SEPARATORS].sort((a, b) => occurrences(b) - occurrences(a));
  if (occurrences(best) > 0) return best;
  const shown = new TextDecoder().decode(header.subarray(0, 80)).trim();
  throw new Refusal([
    {
      sentence: `The file is not a CSV with columns: its header, "${shown}", has no comma, semicolon or tab outside quotes, so it has 1 column, and a data cell needs at least 4.`,
    },
  ]);
}
