import type { Remark } from "../../../shared/schemas/remarks.ts";

/** What others have written or settled since, in a sentence; nothing when that is nothing. */
export function newsIn(before: readonly Remark[], now: readonly Remark[], me: string): string {
  const known = new Map(before.map((remark) => [remark.id, remark]));
  const sentences = now.flatMap((remark) => {
    const earlier = known.get(remark.id);
    if (!earlier) return remark.author.id === me ? [] : [`${remark.author.name} wrote a remark on ${remark.cellName}.`];
    const replies = new Set(earlier.replies.map(({ id }) => id));
    const fresh = remark.replies.filter(({ id, author }) => !replies.has(id) && author.id !== me);
    const { settled } = remark;
    return [
      ...fresh.map(({ author }) => `${author.name} replied on ${remark.cellName}.`),
      ...(settled && !earlier.settled && settled.by.id !== me
        ? [`${settled.by.name} settled a remark on ${remark.cellName}.`]
        : []),
    ];
  });
  return sentences.join(" ");
}
