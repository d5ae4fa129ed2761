import { setKey } from "./edit.ts";

/** What is known of a column before anyone has said what it is. */
export interface ColumnShape {
  readonly name: string;
  readonly type: "number" | "text";
}

type Role = "price" | "quantity" | "expenditure";
const ROLES: Readonly<Record<Role, readonly string[]>> = {
  price: ["price", "prices", "unit_value", "unitvalue", "uv", "p"],
  quantity: ["quantity", "quantities", "qty", "quant", "q"],
  expenditure: ["expenditure", "expenditures", "spending", "spent", "outlay", "value", "exp", "e", "x"],
};
const OTHERS = {
  weight: ["weight", "weights", "wt", "survey_weight", "sampling_weight", "hhweight", "pweight"],
  cluster: ["cluster", "village", "psu", "town", "district", "municipality", "enumeration_area", "store"],
  time: ["time", "week", "month", "quarter", "year", "period", "date", "wave"],
  total: ["total", "total_expenditure", "total_spending"],
} as const;

export interface SuggestedGood {
  readonly price?: string;
  readonly quantity?: string;
  readonly expenditure?: string;
}
export interface Suggestion {
  readonly goods: Readonly<Record<string, SuggestedGood>>;
  readonly weight?: string;
  readonly cluster?: string;
  readonly time?: string;
}

/**
 * What columns mean by their names: p_grains, grains_price, price grains, p1 and the like for prices,
 * the same for quantities and expenditures. A good counts when it has two of the three; of three,
 * price and expenditure are kept where shares come from money, unless quantities alone match.
 */
export function suggestGoods(columns: readonly ColumnShape[]): Suggestion {
  const found = new Map<string, Partial<Record<Role, string>>>();
  for (const column of columns.filter(({ type }) => type === "number")) {
    const meaning = roleOf(column.name);
    if (!meaning) continue;
    const good = found.get(meaning.good) ?? {};
    if (good[meaning.role] === undefined) found.set(meaning.good, { ...good, [meaning.role]: column.name });
  }
  const complete = [...found].flatMap(([good, { price, quantity, expenditure }]) => {
    const two =
      price && expenditure
        ? { price, expenditure }
        : price && quantity
          ? { price, quantity }
          : quantity && expenditure
            ? { quantity, expenditure }
            : undefined;
    return two ? [[goodName(good), two] as const] : [];
  });
  const used = new Set(complete.flatMap(([, two]) => Object.values(two)));
  const left = columns.filter(({ name }) => !used.has(name));
  return {
    goods: Object.fromEntries(complete),
    ...named(
      "weight",
      left.filter(({ type }) => type === "number"),
    ),
    ...named("cluster", left),
    ...named("time", left),
  };
}

/** The source of a fresh data cell on an upload. */
export function suggestData(upload: string, columns: readonly ColumnShape[]): string {
  const { goods, weight, cluster, time } = suggestGoods(columns);
  let source = setKey("", ["upload"], upload);
  const inner = Object.fromEntries(
    Object.entries(goods).map(([name, two]) => [name, { ...two } as Record<string, string>]),
  );
  source = setKey(source, ["goods"], inner);
  for (const [key, column] of Object.entries({ weight, cluster, time })) {
    if (column !== undefined) source = setKey(source, [key], column);
  }
  return source;
}

const words = (name: string): string =>
  name
    .replace(/([a-z])([A-Z])/g, "$1_$2")
    .toLowerCase()
    .replace(/[\s.-]+/g, "_");

function roleOf(name: string): { role: Role; good: string } | undefined {
  const whole = words(name);
  for (const [role, beginnings] of Object.entries(ROLES) as [Role, readonly string[]][]) {
    for (const word of beginnings) {
      const good = goodAfter(whole, word);
      if (good !== undefined) return { role, good };
    }
  }
  return undefined;
}

/** "p_grains", "p1", "grains_p": the word first or last, parted by _ or followed by digits only. */
function goodAfter(whole: string, word: string): string | undefined {
  if (whole.startsWith(`${word}_`) && whole.length > word.length + 1) return whole.slice(word.length + 1);
  if (whole.startsWith(word) && /^\d+$/.test(whole.slice(word.length))) return whole.slice(word.length);
  if (whole.endsWith(`_${word}`) && whole.length > word.length + 1) return whole.slice(0, -word.length - 1);
  return undefined;
}

/** Goods known by a number only get a word, since a map's numeric keys lose their order. */
function goodName(good: string): string {
  return /^\d+$/.test(good) ? `good${good}` : good.replaceAll("_", " ");
}

function named(key: "weight" | "cluster" | "time", columns: readonly ColumnShape[]): Record<string, string> {
  const known: readonly string[] = OTHERS[key];
  const exact = known.map((word) => columns.find(({ name }) => words(name) === word)).find(Boolean);
  const ending = columns.find(({ name }) => known.some((word) => words(name).endsWith(`_${word}`)));
  const column = exact ?? ending;
  return column ? { [key]: column.name } : {};
}
