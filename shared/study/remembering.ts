/**
 * A function of a text that remembers what it returned for the last texts it was given, at most so many
 * characters of them together. What is returned is shared: nobody may change it.
 */
export function remembering<T>(read: (text: string) => T, mostCharacters: number): (text: string) => T {
  const known = new Map<string, T>();
  let characters = 0;
  return (text) => {
    const found = known.get(text);
    if (found !== undefined) {
      // Given up last now: a map keeps the order in which its keys were set.
      known.delete(text);
      known.set(text, found);
      return found;
    }
    const fresh = read(text);
    known.set(text, fresh);
    characters += text.length;
    for (const oldest of known.keys()) {
      if (characters <= mostCharacters || oldest === text) break;
      known.delete(oldest);
      characters -= oldest.length;
    }
    return fresh;
  };
}
