/** In the order in which they are looked for: most browsers call themselves by others' names too. */
const BROWSERS = [
  [/Edg(?:e|A|iOS)?\//, "Edge"],
  [/OPR\/|Opera/, "Opera"],
  [/Firefox\/|FxiOS\//, "Firefox"],
  [/Chrome\/|CriOS\/|Chromium\//, "Chrome"],
  [/Safari\//, "Safari"],
] as const;

const SYSTEMS = [
  [/iPhone|iPad/, "an iPhone or iPad"],
  [/Android/, "Android"],
  [/Windows/, "Windows"],
  [/Mac OS X|Macintosh/, "a Mac"],
  [/Linux|X11/, "Linux"],
] as const;

const nameIn = (list: readonly (readonly [RegExp, string])[], words: string) =>
  list.find(([pattern]) => pattern.test(words))?.[1];

/** A browser's own lengthy name, as a person would say it: "Firefox on Linux". */
export function browserInWords(userAgent: string): string {
  const browser = nameIn(BROWSERS, userAgent);
  const system = nameIn(SYSTEMS, userAgent);
  if (browser === undefined) return "A program that is no known browser";
  return system === undefined ? browser : `${browser} on ${system}`;
}
