/** What a column of a good may be; a share is one of total expenditure. */
export type Meaning = "price" | "quantity" | "expenditure" | "share";

/** Words of the trade for each, the longer first; single letters count at either end of a name only. */
const WORDS: Readonly<Record<Meaning, readonly string[]>> = {
  price: ["unit_value", "unitvalue", "price", "prices", "uv", "pr", "p"],
  quantity: ["quantity", "quantities", "quant", "qty", "q"],
  share: ["budget_share", "budgetshare", "share", "shares", "sh", "w", "s"],
  expenditure: ["expenditure", "expenditures", "spending", "spend", "spent", "outlay", "value", "exp", "e", "x"],
};
const ALL = (Object.entries(WORDS) as [Meaning, readonly string[]][])
  .flatMap(([meaning, words]) => words.map((word) => ({ meaning, word })))
  .sort((a, b) => b.word.length - a.word.length);

export interface ReadName {
  readonly meaning: Meaning;
  /** The rest of the name, by which columns of one good belong together: "sweet_drinks", "3". */
  readonly stem: string;
}

/** Lower case, parts joined by _: "PriceMeat", "price.meat" and "price meat" are price_meat. */
export function plainWords(name: string): string {
  return name
    .replace(/([\p{Ll}\d])(\p{Lu})/gu, "$1_$2")
    .toLowerCase()
    .replace(/[\s.\-/]+/g, "_")
    .replace(/^_+|_+$/g, "");
}

/**
 * What a column is by its name, and of which good: the word first ("p_grains", "p1"), last ("grains_price") or, where
 * it is a word and no letter, between ("food_price_grains"). Undefined where no word is in it, or nothing beside.
 */
export function readName(name: string): ReadName | undefined {
  const whole = plainWords(name);
  for (const { meaning, word } of ALL) {
    const stem = stemBeside(whole, word);
    if (stem !== undefined) return { meaning, stem };
  }
  return undefined;
}

function stemBeside(whole: string, word: string): string | undefined {
  const rest = (stem: string) => (stem.length > 0 ? stem : undefined);
  if (whole.startsWith(`${word}_`)) return rest(whole.slice(word.length + 1));
  if (whole.startsWith(word) && /^\d+$/.test(whole.slice(word.length))) return withoutNoughts(whole.slice(word.length));
  if (whole.endsWith(`_${word}`)) return rest(whole.slice(0, -word.length - 1));
  const between = word.length > 2 ? whole.indexOf(`_${word}_`) : -1;
  return between > 0 ? `${whole.slice(0, between)}_${whole.slice(between + word.length + 2)}` : undefined;
}

/** p01 and q1 are of one good. */
const withoutNoughts = (digits: string) => digits.replace(/^0+(?=\d)/, "");
