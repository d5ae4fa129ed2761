import { type Meaning, plainWords, readName } from "./column-meaning.ts";
import { setKey } from "./edit.ts";

/** What is known of a column before anyone has said what it is. */
export interface ColumnShape {
  readonly name: string;
  readonly type: "number" | "text";
}

const OTHERS = {
  weight: ["weight", "weights", "wt", "survey_weight", "sampling_weight", "hhweight", "pweight"],
  cluster: ["cluster", "village", "psu", "town", "district", "municipality", "enumeration_area", "store"],
  time: ["time", "week", "month", "quarter", "year", "period", "date", "wave"],
} as const;
const TOTALS: ReadonlySet<string> = new Set(["total", "all", "sum", "total_food", "overall"]);
const TOTAL_NAMES: ReadonlySet<string> = new Set([
  "total",
  "total_expenditure",
  "total_spending",
  "totexp",
  "total_exp",
]);
/** Words in the names of columns that describe who buys. */
const DEMOGRAPHIC =
  /(^|_)(members|persons|size|hhsize|household_size|adults|children|kids|age|sex|female|male|urban|rural|schooling|school|education|region|head)(_|$)/;

export interface SuggestedGood {
  readonly price?: string;
  readonly quantity?: string;
  readonly expenditure?: string;
}

/** What columns seem to be by their names: goods with two columns each for sure, the others as guesses. */
export interface Suggestion {
  readonly goods: Readonly<Record<string, SuggestedGood>>;
  /** Columns to derive for them: expenditure as share times total. */
  readonly derive?: Readonly<Record<string, string>>;
  readonly total?: string;
  readonly weight?: string;
  readonly cluster?: string;
  readonly time?: string;
  /** Columns that a system might take as demographics. */
  readonly demographics: readonly string[];
}

type Columns = Partial<Record<Meaning, string>>;

/**
 * What columns mean by their names: p_grains, grains_price, price grains, p1 and the like for prices, the same for
 * quantities, expenditures and budget shares. A good counts when it has two of price, quantity and expenditure, which
 * share their stem; of three, price and expenditure are kept. Where a good has a price and only a share, its
 * expenditure is derived from the share and the total.
 */
export function suggestGoods(columns: readonly ColumnShape[]): Suggestion {
  const numbers = columns.filter(({ type }) => type === "number");
  const stems = new Map<string, Columns>();
  for (const { name } of numbers) {
    const read = readName(name);
    if (!read) continue;
    const found = stems.get(read.stem) ?? {};
    if (found[read.meaning] === undefined) stems.set(read.stem, { ...found, [read.meaning]: name });
  }
  const total = numbers.find(({ name }) => isTotal(name))?.name;
  const derive: Record<string, string> = {};
  const goods = [...stems].flatMap(([stem, found]) => {
    const two = TOTALS.has(stem) ? undefined : (twoOf(found) ?? ofShare(stem, found, total, derive));
    return two ? [[goodName(stem), two] as const] : [];
  });
  const used = new Set(goods.flatMap(([, two]) => Object.values(two)));
  const left = columns.filter(({ name }) => !used.has(name) && name !== total);
  const roles = {
    ...named(
      "weight",
      left.filter(({ type }) => type === "number"),
    ),
    ...named("cluster", left),
    ...named("time", left),
  };
  const taken = new Set(Object.values(roles));
  return {
    goods: Object.fromEntries(goods),
    ...(Object.keys(derive).length > 0 && { derive }),
    ...(total !== undefined && goods.length > 0 && { total }),
    ...roles,
    demographics: left
      .filter(({ name, type }) => type === "number" && !taken.has(name) && DEMOGRAPHIC.test(plainWords(name)))
      .map(({ name }) => name),
  };
}

function isTotal(name: string): boolean {
  const read = readName(name);
  return TOTAL_NAMES.has(plainWords(name)) || (read?.meaning === "expenditure" && TOTALS.has(read.stem));
}

function twoOf({ price, quantity, expenditure }: Columns): SuggestedGood | undefined {
  if (price && expenditure) return { price, expenditure };
  if (price && quantity) return { price, quantity };
  return quantity && expenditure ? { quantity, expenditure } : undefined;
}

const PLAIN_NAME = /^[A-Za-z_][A-Za-z0-9_]*$/;
const inExpression = (column: string) => (PLAIN_NAME.test(column) ? column : `col(${JSON.stringify(column)})`);

function ofShare(
  stem: string,
  { price, share }: Columns,
  total: string | undefined,
  derive: Record<string, string>,
): SuggestedGood | undefined {
  if (!price || !share || total === undefined) return undefined;
  const expenditure = `spent_${stem}`;
  derive[expenditure] = `${inExpression(share)} * ${inExpression(total)}`;
  return { price, expenditure };
}

/** How many columns the goods of a suggestion rest on. */
export function columnsRecognised({ goods, derive = {} }: Suggestion): number {
  // A derived expenditure rests on the share in its place.
  return new Set(Object.values(goods).flatMap((good) => Object.values(good).map((name) => derive[name] ?? name))).size;
}

/** The source of a fresh data cell on an upload: what is recognised for sure, and where, when and how much a row counts. */
export function suggestData(upload: string, columns: readonly ColumnShape[]): string {
  const { goods, derive, weight, cluster, time } = suggestGoods(columns);
  let source = setKey("", ["upload"], upload);
  const inner = Object.fromEntries(
    Object.entries(goods).map(([name, two]) => [name, { ...two } as Record<string, string>]),
  );
  source = setKey(source, ["goods"], inner);
  for (const [key, column] of Object.entries({ weight, cluster, time })) {
    if (column !== undefined) source = setKey(source, [key], column);
  }
  for (const [name, expression] of Object.entries(derive ?? {})) source = setKey(source, ["derive", name], expression);
  return source;
}

/** Goods known by a number only get a word, since a map's numeric keys lose their order. */
function goodName(stem: string): string {
  return /^\d+$/.test(stem) ? `good${stem}` : stem.replaceAll("_", " ");
}

function named(key: "weight" | "cluster" | "time", columns: readonly ColumnShape[]): Record<string, string> {
  const known: readonly string[] = OTHERS[key];
  const exact = known.map((word) => columns.find(({ name }) => plainWords(name) === word)).find(Boolean);
  const ending = columns.find(({ name }) => known.some((word) => plainWords(name).endsWith(`_${word}`)));
  const column = exact ?? ending;
  return column ? { [key]: column.name } : {};
}
