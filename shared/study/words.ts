/** "a", "a and b", "a, b and c". */
export function listWords(words: readonly string[]): string {
  if (words.length < 2) return words.join("");
  return `${words.slice(0, -1).join(", ")} and ${words.at(-1)}`;
}

/** At most `limit` words, then how many more. */
export function listSome(words: readonly string[], limit = 12): string {
  if (words.length <= limit) return words.join(", ");
  return `${words.slice(0, limit).join(", ")} and ${words.length - limit} more`;
}

/** "1 row", "2 rows", with thousands parted by commas. */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${groupThousands(count)} ${count === 1 ? one : many}`;
}

export function groupThousands(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+$)/g, ",");
}

export function capital(text: string): string {
  return text.slice(0, 1).toUpperCase() + text.slice(1);
}

/** "a system cell", "an elasticities cell". */
export function aKind(kind: string): string {
  return `${/^[aeiou]/i.test(kind) ? "an" : "a"} ${kind} cell`;
}
