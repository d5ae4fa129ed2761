import { listSome } from "../../../shared/study/words.ts";
import { printCount } from "../../../shared/tables/numbers.ts";

/** As much of a cell as decides whether it goes into a bundle. */
export interface OfStudy {
  readonly name: string;
  readonly isCurrent: boolean;
}

const NAMED = 6;

/** Which cells do not go along, and how they would; nothing where all do. */
export function leftOutInWords(cells: readonly OfStudy[]): string | undefined {
  const out = cells.filter(({ isCurrent }) => !isCurrent).map(({ name }) => name);
  if (out.length === 0) return undefined;
  const one = out.length === 1;
  return `${listSome(out, NAMED)} ${one ? "is" : "are"} not current: what reads ${one ? "it stays" : "them stays"} out as well, and the bundle says so. Bring the study up to date first, and all of it goes along.`;
}

/** "840 kB", "12.4 MB". */
export function sizeInWords(bytes: number): string {
  if (bytes < 1_000_000) return `${printCount(Math.max(1, Math.round(bytes / 1000)))} kB`;
  return `${(bytes / 1_000_000).toFixed(1)} MB`;
}
