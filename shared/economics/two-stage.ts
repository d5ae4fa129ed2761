import type { Matrix } from "../numerics/matrix.ts";
import type { UnconditionalFormula } from "../schemas/two-stage.ts";
import type { ElasticityValues } from "./elasticities.ts";

/** A group as one good r of the broader system, at a point. */
export interface GroupAsGood {
  /** W_r, its share of the broader total. */
  readonly share: number;
  /** E_r. */
  readonly expenditure: number;
  /** e*_rr, compensated. */
  readonly compensated: number;
  /** e_rs and e*_rs for the other goods s of the broader system, in their order. */
  readonly others: { readonly uncompensated: readonly number[]; readonly compensated: readonly number[] };
}

/** Unconditional elasticities of the group's goods; `shares` are of the broader total, w_i W_r. */
export interface UnconditionalValues extends ElasticityValues {
  /** To the price of each other good s of the broader system, n × (goods of the broader system less one). */
  readonly others: { readonly uncompensated: Matrix; readonly compensated: Matrix };
}

/**
 * How much of the group's compensated elasticity e*_rr reaches good i by the price of good j: w_(r)j E_(r)i E_(r)j, or
 * w_(r)j E_(r)i after Edgerton, in whose formula a price moves the group's index by its share alone.
 */
export function passedOn(
  own: Pick<ElasticityValues, "shares" | "expenditure">,
  i: number,
  j: number,
  formula: UnconditionalFormula,
) {
  const byShare = own.shares[j] * own.expenditure[i];
  return formula === "edgerton" ? byShare : byShare * own.expenditure[j];
}

/**
 * Unconditional elasticities of the goods of a group r whose own system is conditional on what is spent on it, from
 * those of the group as a good of a broader system (two-stage budgeting under weak separability). With conditional
 * elasticities E_(r)i, e_(r)ij, e*_(r)ij and shares w_(r)j within the group, and W_r, E_r, e_rr, e*_rr of the group:
 *
 *     E_i   = E_r E_(r)i
 *     e*_ij = e*_(r)ij + w_(r)j E_(r)i E_(r)j e*_rr          Carpentier & Guyomard
 *     e*_ij = e*_(r)ij + w_(r)j E_(r)i e*_rr                 Edgerton
 *     e_ij  = e*_ij − w_(r)j W_r E_i                         Slutsky, of both
 *     e_is  = E_(r)i e_rs,  e*_is = E_(r)i e*_rs             to the price of another group s
 *
 * Carpentier & Guyomard (2001, American Journal of Agricultural Economics 83, 222–229), Edgerton (1997, American Journal
 * of Agricultural Economics 79, 62–79).
 *
 * Slutsky's line, written out, is Carpentier & Guyomard's e_(r)ij + w_(r)j [1/E_(r)j + e_rr] E_(r)i E_(r)j +
 * w_(r)j W_r E_r E_(r)i (E_(r)j − 1), and Edgerton's e_(r)ij + E_(r)i w_(r)j [1 + e_rr]. The printed formulas are from
 * memory of the works, whose equation numbers are not at hand; `tests/laws/utility-tree.test.ts` derives them.
 *
 * Carpentier & Guyomard's hold exactly under weak separability where the broader elasticities are those of a change of
 * all prices of the group in one proportion; what is approximate is that the group's index in the broader data moves
 * with its prices by their shares. Edgerton's are exact only where every E_(r)j is 1, and break symmetry otherwise.
 */
export function unconditionalValues(
  own: ElasticityValues,
  group: GroupAsGood,
  formula: UnconditionalFormula,
): UnconditionalValues {
  const goods = own.shares.map((_, i) => i);
  const compensated = goods.map((i) =>
    goods.map((j) => own.compensated[i][j] + passedOn(own, i, j, formula) * group.compensated),
  );
  const expenditure = own.expenditure.map((elasticity) => group.expenditure * elasticity);
  const shares = own.shares.map((share) => share * group.share);
  const toOthers = (of: readonly number[]) =>
    own.expenditure.map((elasticity) => of.map((other) => elasticity * other));
  return {
    shares,
    expenditure,
    compensated,
    uncompensated: compensated.map((row, i) => row.map((entry, j) => entry - shares[j] * expenditure[i])),
    others: { uncompensated: toOthers(group.others.uncompensated), compensated: toOthers(group.others.compensated) },
  };
}
