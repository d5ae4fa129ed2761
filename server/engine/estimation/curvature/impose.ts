import type { SystemFinding, SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { DemandSystem, Point, SystemSize } from "../../../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../../../shared/systems/index.ts";
import { Refusal } from "../../refusal.ts";
import type { RunControl } from "../../run.ts";
import type { Estimation } from "../estimation.ts";
import { fitMeasures } from "../fit-measures.ts";
import type { Solution } from "../minimise.ts";
import type { CurvedForm } from "./curved-parts.ts";
import { fitCurved } from "./fit-curved.ts";

/** Where curvature is imposed, in units of estimation, and what that place is called. */
export interface CurvaturePoint {
  readonly point: Point;
  readonly pointName: string;
}

interface Fit {
  readonly estimation: Estimation;
  readonly solution: Solution;
}

/**
 * The fit with negativity imposed at the point, and what the finding says of it; the fit as it is where the
 * specification imposes none.
 *
 * Errors: a rank that a matrix of so many goods cannot have; those of `fitCurved`.
 */
export function imposeCurvature(
  specification: SystemSpecification,
  system: DemandSystem,
  size: SystemSize,
  fit: Fit,
  at: CurvaturePoint | undefined,
  control: RunControl,
): Fit & { readonly curvature?: NonNullable<SystemFinding["curvature"]> } {
  if (specification.curvature === undefined || at === undefined) return fit;
  const most = size.goods - 1;
  const asked = specification.curvature.rank ?? most;
  if (asked > most) {
    const sentence = `curvature asks for rank ${asked}; the Slutsky matrix of ${size.goods} goods has rank ${most} at most, as its rows sum to zero.`;
    throw new Refusal([{ sentence, key: ["curvature", "rank"] }]);
  }
  const task = {
    specification,
    form: specification.form as CurvedForm,
    system,
    size,
    ...fit,
    own: SYSTEMS[specification.form].layout(size).length,
    rank: asked,
    ...at,
  };
  const { rank, binds, ...curved } = fitCurved(task, control);
  const logLikelihoodWithout = fitMeasures(fit.estimation, fit.solution).logLikelihood;
  const { logLikelihood } = fitMeasures(curved.estimation, curved.solution);
  return {
    ...curved,
    curvature: {
      pointName: at.pointName,
      asked,
      rank,
      binds,
      logLikelihoodWithout,
      loss: logLikelihoodWithout - logLikelihood,
    },
  };
}
