/** The names of the demand systems, as a specification's `form` writes them. */
export const SYSTEM_NAMES = ["la-aids", "aids", "les"] as const;

export type SystemName = (typeof SYSTEM_NAMES)[number];

/** Price indices of the linear approximate system (methods: Deaton & Muellbauer 1980; Moschini 1995). */
export const PRICE_INDEX_NAMES = ["tornqvist", "stone", "laspeyres", "paasche"] as const;

export type PriceIndexName = (typeof PRICE_INDEX_NAMES)[number];

/** The restrictions of theory that a specification may impose. */
export const RESTRICTION_NAMES = ["homogeneity", "symmetry"] as const;

export type RestrictionName = (typeof RESTRICTION_NAMES)[number];
