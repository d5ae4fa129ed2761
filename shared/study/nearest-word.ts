/**
 * Damerau–Levenshtein distance in its restricted form (optimal string alignment): insertions,
 * deletions, substitutions and swaps of neighbours each count one (Damerau 1964; Levenshtein 1966).
 */
export function editDistance(left: string, right: string): number {
  const width = right.length + 1;
  let beforeLast: number[] = [];
  let last = Array.from({ length: width }, (_, j) => j);
  for (let i = 1; i <= left.length; i++) {
    const row = [i];
    for (let j = 1; j < width; j++) {
      const change = left[i - 1] === right[j - 1] ? 0 : 1;
      let cost = Math.min(row[j - 1] + 1, last[j] + 1, last[j - 1] + change);
      if (i > 1 && j > 1 && left[i - 1] === right[j - 2] && left[i - 2] === right[j - 1]) {
        cost = Math.min(cost, beforeLast[j - 2] + 1);
      }
      row.push(cost);
    }
    beforeLast = last;
    last = row;
  }
  return last[right.length];
}

/** Longer ones are not mistypings of anything, and comparing them costs time. */
const LONGEST_WORD = 80;

/** Words differing in case, spaces, hyphens and underscores only are the same word mistyped. */
const plain = (word: string): string =>
  word
    .toLowerCase()
    .replace(/[\s_-]+/g, " ")
    .trim();

/**
 * The valid word a person most likely meant, or none when nothing is near: at most a third of the
 * letters may be wrong (always at least one, but never the whole word), or the word is the beginning
 * of exactly one candidate. The earlier candidate wins a tie.
 */
export function nearestWord(word: string, candidates: Iterable<string>): string | undefined {
  const written = plain(word.slice(0, LONGEST_WORD));
  if (written === "") return undefined;
  const words = [...candidates].map((candidate) => ({ candidate, plain: plain(candidate) }));
  let nearest: string | undefined;
  let smallest = Number.POSITIVE_INFINITY;
  for (const entry of words) {
    const longer = Math.max(written.length, entry.plain.length);
    const allowed = Math.min(Math.max(1, Math.floor(longer / 3)), longer - 1);
    if (Math.abs(written.length - entry.plain.length) > allowed) continue;
    const distance = editDistance(written, entry.plain);
    if (distance <= allowed && distance < smallest) {
      smallest = distance;
      nearest = entry.candidate;
    }
  }
  if (nearest !== undefined || written.length < 3) return nearest;
  const begun = words.filter((entry) => entry.plain.startsWith(written));
  return begun.length === 1 ? begun[0].candidate : undefined;
}
