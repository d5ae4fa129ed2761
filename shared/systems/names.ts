/** The names of the demand systems, as a specification's `form` writes them. */
export const SYSTEM_NAMES = ["la-aids", "aids", "quaids", "les", "easi", "rotterdam"] as const;

export type SystemName = (typeof SYSTEM_NAMES)[number];

/** Price indices of the linear approximate system (methods: Deaton & Muellbauer 1980; Moschini 1995). */
export const PRICE_INDEX_NAMES = ["tornqvist", "stone", "laspeyres", "paasche", "lagged stone"] as const;

export type PriceIndexName = (typeof PRICE_INDEX_NAMES)[number];

/** The restrictions of theory that a specification may impose. */
export const RESTRICTION_NAMES = ["homogeneity", "symmetry"] as const;

export type RestrictionName = (typeof RESTRICTION_NAMES)[number];

/** Which products EASI has beside main effects (B, A_l and D of Lewbel & Pendakur 2009). */
export const INTERACTION_NAMES = [
  "prices with expenditure",
  "prices with demographics",
  "expenditure with demographics",
] as const;

export type InteractionName = (typeof INTERACTION_NAMES)[number];
