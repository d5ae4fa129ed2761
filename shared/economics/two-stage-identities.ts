import type { UnconditionalFormula } from "../schemas/two-stage.ts";
import type { ElasticityValues } from "./elasticities.ts";
import type { GroupAsGood, UnconditionalValues } from "./two-stage.ts";

/** By how much each law that ties unconditional elasticities to those of the group is missed, at most. */
export interface UnconditionalIdentities {
  /** Σ_i w_(r)i E_i = E_r. */
  readonly engel: number;
  /** Σ_i w_(r)i e*_ij = w_(r)j E_(r)j e*_rr, less W_r E_r w_(r)j of both sides uncompensated; Edgerton's without E_(r)j. */
  readonly cournot: number;
  /** Σ_j e_ij = E_(r)i e_rr: a change of all prices of the group in one proportion. */
  readonly groupPrice: number;
  /** Σ_j e_ij + Σ_s e_is + E_i = 0. */
  readonly homogeneity: number;
  /** w_(r)i e*_ij = w_(r)j e*_ji; Edgerton's miss it wherever expenditure elasticities within the group differ. */
  readonly symmetry: number;
}

/** The largest deviations from the laws above. Each but the last holds where those of the two systems themselves do. */
export function unconditionalIdentities(
  own: ElasticityValues,
  group: GroupAsGood,
  unconditional: UnconditionalValues,
  formula: UnconditionalFormula,
): UnconditionalIdentities {
  const { shares, expenditure: within } = own;
  const { expenditure, uncompensated, compensated, others } = unconditional;
  const goods = shares.map((_, i) => i);
  const over = (term: (i: number) => number) => goods.reduce((sum, i) => sum + term(i), 0);
  const largest = (gap: (i: number) => number) => Math.max(...goods.map((i) => Math.abs(gap(i))));
  const ownPrice = group.compensated - group.share * group.expenditure;
  const reached = (j: number) => shares[j] * (formula === "edgerton" ? 1 : within[j]) * group.compensated;
  return {
    engel: Math.abs(over((i) => shares[i] * expenditure[i]) - group.expenditure),
    cournot: largest(
      (j) => over((i) => shares[i] * uncompensated[i][j]) - reached(j) + group.share * group.expenditure * shares[j],
    ),
    groupPrice: largest((i) => over((j) => uncompensated[i][j]) - within[i] * ownPrice),
    homogeneity: largest(
      (i) =>
        over((j) => uncompensated[i][j]) + others.uncompensated[i].reduce((sum, one) => sum + one, 0) + expenditure[i],
    ),
    symmetry: largest((i) =>
      goods.reduce(
        (most, j) => Math.max(most, Math.abs(shares[i] * compensated[i][j] - shares[j] * compensated[j][i])),
        0,
      ),
    ),
  };
}
