import { QUOTABLE_WORDS, type QuotableKind, type QuotableWord } from "../schemas/quotable.ts";

/** What a word needs beside it. */
export type QuotableNeeds =
  | "nothing"
  | "good"
  | "two goods"
  | "demographic and good"
  | "hypothesis"
  | "rank"
  /** Of an elasticities cell by groups, the name of one. */
  | "group"
  | "good and group"
  | "two goods and group";

export interface Quotable {
  readonly word: string;
  /** One line: what the number is. */
  readonly says: string;
  readonly needs: QuotableNeeds;
  /** Whether it has a standard error, which `alone` leaves out and `error` gives alone. */
  readonly parts: boolean;
}

type Told = readonly [says: string, needs?: QuotableNeeds, parts?: "parts"];
type WordsOf<K extends QuotableKind> = { readonly [W in QuotableWord<K>]: Told };

/** Typed over the words: one without a line does not compile. */
const TOLD: { readonly [K in QuotableKind]: WordsOf<K> } = {
  data: {
    "rows used": ["rows used"],
    "rows uploaded": ["rows of the upload"],
    "rows left out": ["rows left out, for every reason"],
    goods: ["how many goods there are"],
    clusters: ["how many clusters there are"],
    "mean expenditure": ["mean total expenditure, in the units uploaded"],
    "mean share": ["mean budget share of a good", "good"],
    "mean price": ["mean price of a good, in the units uploaded", "good"],
    "bought none": ["share of rows that buy none of a good", "good"],
  },
  system: {
    eta: ["expenditure elasticity of a good, where the checks stand", "good", "parts"],
    alpha: ["α, the constant of a good's equation", "good", "parts"],
    beta: ["β, the coefficient of ln x of a good", "good", "parts"],
    gamma: ["γ, the coefficient of a price: good, then the good of the price", "two goods", "parts"],
    lambda: ["λ, the coefficient of (ln x)² of a good", "good", "parts"],
    committed: ["c, the committed quantity of a good", "good", "parts"],
    marginal: ["the marginal budget share of a good", "good", "parts"],
    pi: ["π, the Slutsky coefficient: good, then the good of the price", "two goods", "parts"],
    constant: ["b₀, the constant of a good's equation", "good", "parts"],
    price: ["a, the coefficient of a price: good, then the good of the price", "two goods", "parts"],
    demographic: ["the coefficient of a demographic: column, then good", "demographic and good", "parts"],
    "log likelihood": ["the log-likelihood at the estimates"],
    aic: ["Akaike's criterion"],
    bic: ["the Bayesian criterion"],
    r2: ["R² of a good's equation", "good"],
    "system r2": ["R² of the system"],
    "durbin-watson": ["Durbin and Watson's statistic of a good's equation", "good"],
    rows: ["rows of the equations"],
    parameters: ["free coefficients"],
    clusters: ["clusters of the standard errors"],
    "homogeneity p": ["p of the likelihood ratio for homogeneity"],
    "homogeneity statistic": ["likelihood ratio for homogeneity"],
    "symmetry p": ["p of the likelihood ratio for symmetry given homogeneity"],
    "symmetry statistic": ["likelihood ratio for symmetry given homogeneity"],
    "quadratic p": ["p of the likelihood ratio for no quadratic terms"],
    "quadratic statistic": ["likelihood ratio for no quadratic terms"],
    "exogeneity p": ["p of the test that total expenditure is exogenous"],
    "exogeneity statistic": ["statistic of the test that total expenditure is exogenous"],
    "first stage f": ["F of the instruments in the first stage"],
    "largest eigenvalue": ["largest eigenvalue of the Slutsky matrix, where the checks stand", "nothing", "parts"],
    "rows that hold": ["share of rows in which negativity holds"],
    "rows that break": ["rows in which negativity breaks"],
  },
  tests: {
    p: ["p of a hypothesis, by Wald's test unless another is named", "hypothesis"],
    statistic: ["statistic of a hypothesis, Wald's unless another is named", "hypothesis"],
    "degrees of freedom": ["degrees of freedom of a hypothesis", "hypothesis"],
    afriat: ["Afriat's critical cost efficiency index"],
    violations: ["pairs of rows that violate revealed preference"],
  },
  elasticities: {
    eta: ["expenditure elasticity of a good", "good and group", "parts"],
    uncompensated: ["uncompensated elasticity: good, then the good of the price", "two goods and group", "parts"],
    compensated: ["compensated elasticity: good, then the good of the price", "two goods and group", "parts"],
    "eta interval": ["interval of the expenditure elasticity of a good", "good and group"],
    "uncompensated interval": ["interval of an uncompensated elasticity", "two goods and group"],
    "compensated interval": ["interval of a compensated elasticity", "two goods and group"],
    "unconditional eta": ["expenditure elasticity of a good given the whole budget", "good", "parts"],
    "unconditional uncompensated": [
      "uncompensated elasticity given the whole budget: good, then the good of the price",
      "two goods",
      "parts",
    ],
    "unconditional compensated": [
      "compensated elasticity given the whole budget: good, then the good of the price",
      "two goods",
      "parts",
    ],
    "unconditional eta interval": ["interval of an unconditional expenditure elasticity of a good", "good"],
    share: ["budget share of a good in the formulas", "good and group"],
    rows: ["rows of a group", "group"],
  },
  slutsky: {
    entry: ["an entry of the matrix, in the form of the cell: good, then the good of the price", "two goods", "parts"],
    compensated: ["compensated elasticity: good, then the good of the price", "two goods", "parts"],
    eigenvalue: ["an eigenvalue by its rank, the largest being 1", "rank", "parts"],
    "largest eigenvalue": ["the largest eigenvalue", "nothing", "parts"],
    "rows that hold": ["share of rows in which negativity holds"],
    "rows that break": ["rows in which negativity breaks"],
    share: ["predicted budget share of a good at the point", "good"],
    rows: ["rows over which negativity was checked"],
  },
  "price change": {
    cv: ["compensating variation at the point, or the mean of a group", "group", "parts"],
    ev: ["equivalent variation at the point, or the mean of a group", "group", "parts"],
    "cv share": ["compensating variation by expenditure, at the point or of a group", "group", "parts"],
    "ev share": ["equivalent variation by expenditure, at the point or of a group", "group", "parts"],
    "second order": ["compensating variation to second order, at the point or of a group", "group", "parts"],
    surplus: ["loss of Marshallian surplus at the point", "nothing", "parts"],
    "cost of living": ["cost of living at the utility before, before the change 1", "nothing", "parts"],
    revenue: ["revenue of the taxes, at the point or of a group", "group", "parts"],
    "excess burden": ["excess burden of the taxes, at the point or of a group", "group", "parts"],
    "marginal cost": ["marginal cost of funds, at the point or of a group", "group", "parts"],
    substitution: ["substitution effect on the quantity of a good, at the utility before", "good", "parts"],
    income: ["income effect on the quantity of a good", "good", "parts"],
    change: ["change of the quantity of a good", "good", "parts"],
    rows: ["rows of a group, or of all", "group"],
  },
};

/** The numbers prose may quote of each kind of cell, in the order in which they are offered. */
export const QUOTABLE: { readonly [K in QuotableKind]: readonly Quotable[] } = {
  data: listed("data"),
  system: listed("system"),
  tests: listed("tests"),
  elasticities: listed("elasticities"),
  slutsky: listed("slutsky"),
  "price change": listed("price change"),
};

function listed(kind: QuotableKind): Quotable[] {
  const told = TOLD[kind] as Readonly<Record<string, Told>>;
  return QUOTABLE_WORDS[kind].map((word) => {
    const [says, needs = "nothing", parts] = told[word];
    return { word, says, needs, parts: parts !== undefined };
  });
}

/** Other ways to write a word: its sign, or its long name. */
const ALSO: Readonly<Record<string, string>> = {
  η: "eta",
  α: "alpha",
  β: "beta",
  γ: "gamma",
  λ: "lambda",
  π: "pi",
  ε: "uncompensated",
  "r²": "r2",
  "system r²": "system r2",
  "log-likelihood": "log likelihood",
  "durbin watson": "durbin-watson",
  df: "degrees of freedom",
};

/** A word as it is compared: in small letters, one space between parts. */
export const plainWord = (word: string): string => word.trim().toLowerCase().replace(/\s+/g, " ");

/** The entry of the vocabulary that a written word means. */
export function quotable(kind: QuotableKind, written: string): Quotable | undefined {
  const plain = plainWord(written);
  const word = ALSO[plain] ?? plain;
  return QUOTABLE[kind].find((one) => one.word === word);
}

/** How many goods, and what else, stand after a word. */
export function goodsNeeded(needs: QuotableNeeds): number {
  if (needs.startsWith("two goods")) return 2;
  return needs === "good" || needs === "good and group" || needs === "demographic and good" ? 1 : 0;
}
