/**
 * What prose may quote of a cell, by the kind of cell. What each word says and needs is in shared/study/quotable.ts;
 * how it is printed in shared/tables/quoted.
 */
export const QUOTABLE_WORDS = {
  data: [
    "rows used",
    "rows uploaded",
    "rows left out",
    "goods",
    "clusters",
    "mean expenditure",
    "mean share",
    "mean price",
    "bought none",
  ],
  system: [
    "eta",
    "alpha",
    "beta",
    "gamma",
    "lambda",
    "committed",
    "marginal",
    "pi",
    "constant",
    "price",
    "demographic",
    "log likelihood",
    "aic",
    "bic",
    "r2",
    "system r2",
    "durbin-watson",
    "rows",
    "parameters",
    "clusters",
    "homogeneity p",
    "homogeneity statistic",
    "symmetry p",
    "symmetry statistic",
    "quadratic p",
    "quadratic statistic",
    "exogeneity p",
    "exogeneity statistic",
    "first stage f",
    "largest eigenvalue",
    "rows that hold",
    "rows that break",
  ],
  tests: ["p", "statistic", "degrees of freedom", "afriat", "violations"],
  elasticities: [
    "eta",
    "uncompensated",
    "compensated",
    "eta interval",
    "uncompensated interval",
    "compensated interval",
    "unconditional eta",
    "unconditional uncompensated",
    "unconditional compensated",
    "unconditional eta interval",
    "share",
    "rows",
  ],
  slutsky: [
    "entry",
    "compensated",
    "eigenvalue",
    "largest eigenvalue",
    "rows that hold",
    "rows that break",
    "share",
    "rows",
  ],
  "price change": [
    "cv",
    "ev",
    "cv share",
    "ev share",
    "second order",
    "surplus",
    "cost of living",
    "revenue",
    "excess burden",
    "marginal cost",
    "substitution",
    "income",
    "change",
    "rows",
  ],
} as const;

/** The kinds of cell that have numbers to quote. */
export type QuotableKind = keyof typeof QUOTABLE_WORDS;
export type QuotableWord<K extends QuotableKind> = (typeof QUOTABLE_WORDS)[K][number];

/** Said last, of a number with a standard error: the number alone, or the standard error alone. */
export const QUOTED_PARTS = ["alone", "error"] as const;
export type QuotedPart = (typeof QUOTED_PARTS)[number];

/** The statistics a hypothesis may be told by; Wald's where none is named. */
export const QUOTED_STATISTICS = ["wald", "likelihood ratio", "score", "corrected", "laitinen"] as const;
export type QuotedStatistic = (typeof QUOTED_STATISTICS)[number];

export function isQuotable(kind: string): kind is QuotableKind {
  return Object.hasOwn(QUOTABLE_WORDS, kind);
}
