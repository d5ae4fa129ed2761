import { z } from "zod";
import { CELL_KINDS, type CellKind, SPECIFICATIONS, type SpecificationOf } from "../schemas/cell.ts";

/** A key of a cell's source, as the editor offers it. */
export interface KeyWord {
  readonly key: string;
  /** One line: what the key says. */
  readonly says: string;
  readonly needed: boolean;
  /** Whether it takes a list. */
  readonly list: boolean;
  /** The words it may have, when they are few and fixed. */
  readonly values: readonly string[];
  /** What else its value names. */
  readonly names?: "upload" | "column" | "numeric column" | "good" | CellKind;
  /** Keys of the map it takes; under any name when `named`. */
  readonly keys: readonly KeyWord[];
  readonly named: boolean;
}

/** Which keys of a kind name another cell, and of which kind. */
export const REFERENCES: { readonly [K in CellKind]: Readonly<Record<string, CellKind>> } = {
  data: {},
  system: { data: "data" },
  tests: { system: "system", data: "data" },
  elasticities: { system: "system", within: "system" },
  slutsky: { system: "system" },
  "price change": { system: "system" },
  figure: { system: "system", data: "data", "price change": "price change" },
  // Its quotations lead to cells of every kind: shared/study/quotations.ts.
  text: {},
};

/** A system cell takes over every key it does not give itself from the cell it is `like`. */
export const LIKE = "like";

type Told = readonly [says: string, names?: KeyWord["names"]];
type KeysOf<K extends CellKind> = Exclude<keyof SpecificationOf<K>, "kind">;

/** Typed over the schemas' own keys: a key without a line, or a line without a key, does not compile. */
const KEYS: { readonly [K in CellKind]: Readonly<Record<KeysOf<K>, Told>> } = {
  data: {
    upload: ["the uploaded file the columns come from", "upload"],
    version: ["which version of the upload is read; the latest unless one is named"],
    goods: ["each good by two of price, quantity and expenditure"],
    total: ["the column of total expenditure, when it is not the sum of the goods", "numeric column"],
    weight: ["the column of sampling weights", "numeric column"],
    cluster: ["the column that says which rows were sampled together", "column"],
    time: ["the column of the period", "column"],
    derive: ["new columns from expressions in others, such as log(members)"],
    keep: ["a condition; rows that do not meet it are left out"],
    normalise: ["mean divides prices and total by their weighted means, none leaves units alone"],
  },
  system: {
    data: ["the name of the data cell it is estimated on", "data"],
    form: ["the functional form of the share equations"],
    index: ["the price index of la-aids"],
    impose: ["the restrictions of theory that are imposed"],
    estimator: ["how the share equations are estimated"],
    demographics: ["columns that shift the intercepts", "numeric column"],
    alpha0: ["the constant of the translog price index, fixed and not estimated"],
    dropped: ["the good whose equation is left out; results do not depend on it under maximum likelihood", "good"],
    "standard errors": ["conventional, heteroskedastic, by cluster, or by bootstrap"],
    errors: ["of les: whether the errors stand on shares or on expenditures"],
    degree: ["of easi: the degree of the Engel curves in real expenditure"],
    interactions: ["of easi: which products enter beside main effects"],
    "real expenditure": ["of easi: exact, or approximate by mean shares"],
    differences: ["changes from period to period instead of levels"],
    season: ["seasonal terms that shift the intercepts"],
    trend: ["a linear trend that shifts the intercepts"],
    instruments: ["columns that explain an endogenous total expenditure", "numeric column"],
    zeros: ["goods not bought, by two steps: first participation, then shares"],
    "conditional on": ["the group of goods whose expenditure the total is; results are labelled conditional on it"],
    curvature: ["negativity imposed at a point, with the rank of the matrix there"],
  },
  tests: {
    system: ["the name of the system cell whose restrictions are tested; or give data", "system"],
    data: ["the name of a data cell, for revealed preference, which needs no system", "data"],
    of: ["which hypotheses; all that the system admits unless some are named"],
    level: ["the probability below which a test rejects; 0.05 unless said otherwise"],
  },
  elasticities: {
    system: ["the name of the system cell it evaluates", "system"],
    at: ["one point: base point, mean, a row, a quantile of expenditure, or prices and x of one's own"],
    groups: ["groups of rows: by a column, or by total expenditure"],
    over: ["at the mean point, or over the rows, each weighted by what it spends"],
    shares: ["which shares stand in the formulas: predicted by the system, or observed means"],
    index: ["of Stone's index in la-aids: its weights held, or moving with the shares"],
    level: ["the level of confidence of intervals and classes; 0.95 unless said otherwise"],
    within: ["a broader system in which these goods are one good: unconditional elasticities", "system"],
    as: ["which good of the broader system these goods are", "good"],
    unconditional: ["by which formula: carpentier guyomard unless said otherwise, or edgerton"],
  },
  slutsky: {
    system: ["the name of the system cell it evaluates", "system"],
    at: ["where: base point, mean, a row, a quantile of expenditure, or prices and x of one's own"],
    form: ["share form k, or quantity form S in the units uploaded"],
  },
  "price change": {
    system: ["the name of the system cell it evaluates", "system"],
    at: [
      "where the effects are taken: base point, mean, a row, a quantile of expenditure, or prices and x of one's own",
    ],
    prices: ["by good: how its price changes, and whether that is a tax", "good"],
    expenditure: ["change of total expenditure in per cent; 0 unless said otherwise"],
    groups: ["who bears it: by a column, by total expenditure, or by expenditure per equivalent adult"],
    "equivalence scale": ["a column of equivalent adults, or the square root of a column of members", "numeric column"],
    level: ["the level of confidence of intervals; 0.95 unless said otherwise"],
  },
  figure: {
    system: ["the name of the system cell it is drawn of; or give data or price change", "system"],
    data: ["the name of the data cell it is drawn of", "data"],
    "price change": ["the name of the price change cell whose incidence it shows", "price change"],
    show: ["what against what"],
    goods: ["which goods; all unless some are named, one for a demand curve and for prices", "good"],
    at: ["where the rest stands: base point, mean, a row, a quantile of expenditure, or prices and x of one's own"],
    groups: ["groups of rows: by a column, or by total expenditure"],
    level: ["the level of confidence of intervals; 0.95 unless said otherwise"],
  },
  text: {
    text: ["prose in Markdown with mathematics, and numbers quoted as {base: eta, grains}"],
  },
};

const INNER: Readonly<Record<string, Told>> = {
  price: ["the column of its price", "numeric column"],
  quantity: ["the column of its quantity", "numeric column"],
  expenditure: ["the column of what was spent on it", "numeric column"],
  of: ["the column whose values part the rows, or total expenditure", "column"],
  quantiles: ["so many groups of equal weight, lowest first: 5 for fifths"],
  row: ["a row of the upload, the first after the header being 1"],
  x: ["total expenditure: quantile 0.9 at mean prices, or an amount beside prices"],
  prices: ["the price of each good, in the units uploaded"],
  cluster: ["the column that says which rows were sampled together", "column"],
  bootstrap: ["what is drawn again: rows, clusters, residuals, or blocks of consecutive periods"],
  replicates: ["how often; 500 unless said otherwise"],
  seed: ["a whole number from which the draws follow"],
  block: ["the length of a block, in periods"],
  period: ["periods in one round of the seasons: 4, 12, 52"],
  harmonics: ["pairs of sine and cosine instead of a dummy for every period"],
  at: ["where: base point, mean or a row"],
  rank: ["the rank of the matrix at the point; one less than the goods unless said otherwise"],
  "per cent": ["by so many per cent of the price before"],
  to: ["to this price, in the units uploaded"],
  "ad valorem": ["a tax in per cent of what the seller receives; a subsidy below 0"],
  specific: ["a tax per unit, in the units uploaded; a subsidy below 0"],
  tax: ["whether the change is a tax: revenue is counted for those only"],
  "pass-through": ["the share of the tax that reaches the price; 1 unless said otherwise"],
  "square root of": ["the column of members of the household", "numeric column"],
  "two-step": ["columns that explain whether a good is bought at all", "numeric column"],
};

const LIKE_KEY: KeyWord = {
  key: LIKE,
  says: "the name of a system cell whose keys it takes over unless it gives them itself",
  needed: false,
  list: false,
  values: [],
  names: "system",
  keys: [],
  named: false,
};

type Shape = Readonly<Record<string, z.ZodType>>;

/** Looks through defaults and options at the schema that says what a value may be. */
function bare(schema: z.ZodType): z.ZodType {
  if (schema instanceof z.ZodOptional || schema instanceof z.ZodDefault) return bare(schema.unwrap() as z.ZodType);
  if (schema instanceof z.ZodPipe) return bare(schema.in as z.ZodType);
  return schema;
}

function wordsOf(schema: z.ZodType): string[] {
  const inner = bare(schema);
  if (inner instanceof z.ZodEnum) return inner.options.map(String);
  if (inner instanceof z.ZodLiteral) return [...inner.values].map(String);
  if (inner instanceof z.ZodArray) return wordsOf(inner.element as z.ZodType);
  if (inner instanceof z.ZodUnion) return inner.options.flatMap((option) => wordsOf(option as z.ZodType));
  return [];
}

function keysWithin(schema: z.ZodType): KeyWord[] {
  const inner = bare(schema);
  if (inner instanceof z.ZodRecord) return keysWithin(inner.valueType as z.ZodType);
  if (inner instanceof z.ZodUnion) {
    const all = inner.options.flatMap((option) => keysWithin(option as z.ZodType));
    return all.filter((word, i) => all.findIndex((other) => other.key === word.key) === i);
  }
  return inner instanceof z.ZodObject ? keyWords(inner.shape as Shape, INNER) : [];
}

function keyWords(shape: Shape, told: Readonly<Record<string, Told>>): KeyWord[] {
  return Object.entries(shape)
    .filter(([key]) => key !== "kind")
    .map(([key, schema]) => ({
      key,
      says: told[key][0],
      needed: !(schema instanceof z.ZodOptional || schema instanceof z.ZodDefault),
      list: bare(schema) instanceof z.ZodArray,
      values: wordsOf(schema),
      ...(told[key][1] && { names: told[key][1] }),
      keys: keysWithin(schema),
      named: bare(schema) instanceof z.ZodRecord,
    }));
}

function vocabularyOf(kind: CellKind): readonly KeyWord[] {
  const words = keyWords(SPECIFICATIONS[kind].shape as Shape, KEYS[kind]);
  return kind === "system" ? [...words, LIKE_KEY] : words;
}

/** Every key of every kind, read off the schemas. */
export const VOCABULARY = Object.fromEntries(CELL_KINDS.map((kind) => [kind, vocabularyOf(kind)])) as Readonly<
  Record<CellKind, readonly KeyWord[]>
>;

export function keyWord(kind: CellKind, key: string): KeyWord | undefined {
  return VOCABULARY[kind].find((word) => word.key === key);
}
