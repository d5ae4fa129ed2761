import { type Matrix, standardError } from "../numerics/matrix.ts";
import type { UnconditionalFormula } from "../schemas/two-stage.ts";
import type { FittedCoefficients } from "../systems/index.ts";
import { type Elasticities, elasticityGradients, elasticityValues } from "./elasticities.ts";
import { combined } from "./evaluation.ts";
import type { ResponseGradients, Responses } from "./responses.ts";
import { type GroupAsGood, passedOn, type UnconditionalValues, unconditionalValues } from "./two-stage.ts";

/** One of the two systems at its point: responses, their derivatives in its θ, and the covariance of θ. */
export interface Stage {
  readonly responses: Responses;
  readonly gradients: ResponseGradients;
  readonly covariance: FittedCoefficients["covariance"];
}

/** How errors of the two systems go together: uncorrelated, or, of the same rows, however they may be correlated. */
export type StageErrors = "independent" | "bound";

export interface UnconditionalElasticities extends Elasticities, UnconditionalValues {
  readonly othersErrors: { readonly uncompensated: Matrix; readonly compensated: Matrix };
}

/** The elasticities of good r of a system as those of a group. */
export function groupAsGood(broader: Responses, r: number): GroupAsGood {
  const { shares, expenditure, uncompensated, compensated } = elasticityValues(broader);
  const others = (row: readonly number[]) => row.filter((_, s) => s !== r);
  return {
    share: shares[r],
    expenditure: expenditure[r],
    compensated: compensated[r][r],
    others: { uncompensated: others(uncompensated[r]), compensated: others(compensated[r]) },
  };
}

/**
 * `unconditionalValues` with standard errors by the delta method, exact derivatives in the coefficients of both
 * systems. With σ and τ the errors that come of the group's own and of the broader system's coefficients:
 *
 *     independent   √(σ² + τ²)
 *     bound         σ + τ, which no correlation between the two systems' estimates can exceed (Cauchy & Schwarz)
 *
 * @param r which good of the broader system the group is
 */
export function unconditionalElasticities(
  own: Stage,
  broader: Stage,
  r: number,
  { formula, errors, poll = () => {} }: { formula: UnconditionalFormula; errors: StageErrors; poll?: () => void },
): UnconditionalElasticities {
  const within = elasticityValues(own.responses);
  const group = groupAsGood(broader.responses, r);
  const inOwn = elasticityGradients(own.responses, own.gradients);
  const inBroader = elasticityGradients(broader.responses, broader.gradients);
  const isByShare = formula === "edgerton";
  const { shares: w, expenditure: E } = within;
  const marginal = group.share * group.expenditure;
  const inMarginal = combined([1, broader.gradients.shares[r]], [1, broader.gradients.total[r]]);
  const errorOf = (ofOwn: number[], ofBroader: number[]) => {
    const [sigma, tau] = [standardError(own.covariance, ofOwn), standardError(broader.covariance, ofBroader)];
    return errors === "bound" ? sigma + tau : Math.hypot(sigma, tau);
  };
  const compensatedIn = (i: number, j: number) => {
    const reach = isByShare ? 1 : E[j];
    const a = group.compensated;
    return combined(
      [1, inOwn.compensated[i][j]],
      [a * E[i] * reach, own.gradients.shares[j]],
      [a * w[j] * reach, inOwn.expenditure[i]],
      [isByShare ? 0 : a * w[j] * E[i], inOwn.expenditure[j]],
    );
  };
  const byPair = (error: (i: number, j: number) => number) =>
    w.map((_, i) => {
      poll();
      return w.map((_, j) => error(i, j));
    });
  const toOthers = (which: "uncompensated" | "compensated") => {
    const rows = inBroader[which][r].filter((_, s) => s !== r);
    return E.map((elasticity, i) =>
      group.others[which].map((other, s) =>
        errorOf(combined([other, inOwn.expenditure[i]]), combined([elasticity, rows[s]])),
      ),
    );
  };
  return {
    ...unconditionalValues(within, group, formula),
    expenditureErrors: E.map((elasticity, i) =>
      errorOf(combined([group.expenditure, inOwn.expenditure[i]]), combined([elasticity, inBroader.expenditure[r]])),
    ),
    compensatedErrors: byPair((i, j) =>
      errorOf(compensatedIn(i, j), combined([passedOn(within, i, j, formula), inBroader.compensated[r][r]])),
    ),
    uncompensatedErrors: byPair((i, j) =>
      errorOf(
        combined(
          [1, compensatedIn(i, j)],
          [-marginal * E[i], own.gradients.shares[j]],
          [-marginal * w[j], inOwn.expenditure[i]],
        ),
        combined([passedOn(within, i, j, formula), inBroader.compensated[r][r]], [-w[j] * E[i], inMarginal]),
      ),
    ),
    othersErrors: { uncompensated: toOthers("uncompensated"), compensated: toOthers("compensated") },
  };
}
