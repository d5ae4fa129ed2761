import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import type { DemandSystem } from "../../../shared/systems/demand-system.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import type { MomentForm } from "../../../shared/systems/moment-form.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { systemInDifferences } from "./differences.ts";
import { withFirstSteps } from "./first-steps/extensions.ts";
import type { SampleRequest } from "./sample.ts";

type Asked = Pick<SystemSpecification, "form" | "index" | "errors" | "differences">;

/** Which rows and responses a specification asks for; absent where they are the shares at every row used. */
export function sampleOf({ form, index, errors, differences }: Asked): SampleRequest | undefined {
  const ofChanges = SYSTEMS[form].kind === "differences";
  const sample: SampleRequest = {
    responses: errors === "expenditures" ? "expenditures" : ofChanges ? "contributions to volume" : "shares",
    differences: ofChanges || differences === true,
    lagged: form === "la-aids" && index === "lagged stone",
  };
  const plain = sample.responses === "shares" && !sample.differences && !sample.lagged;
  return plain ? undefined : sample;
}

/** What in a specification needs one row a period in the order of time, and under which key it was asked for. */
export function needsPeriods({ form, index, differences }: Asked): { what: string; key: string[] } | undefined {
  const { kind, longName } = SYSTEMS[form];
  if (kind === "differences") return { what: `The ${longName}`, key: ["form"] };
  if (differences) return { what: "A system in differences", key: ["differences"] };
  return index === "lagged stone" ? { what: "The lagged Stone index", key: ["index"] } : undefined;
}

/**
 * The demand system as the estimator is to see it: with its equations for expenditures where errors stand on
 * those, and for changes of shares where it is estimated in differences. Its coefficients and what they mean
 * at a point stay as they are.
 */
export function specifiedSystem(specification: SystemSpecification, data: PreparedData): DemandSystem {
  const system = withFirstSteps(SYSTEMS[specification.form], specification, data);
  if (specification.errors === "expenditures" && system.expenditureMoments) {
    return inExpenditures(system, system.expenditureMoments);
  }
  return specification.differences ? systemInDifferences(system, specification, data) : system;
}

/** Iteration starts from the shares that mean expenditures make. */
function inExpenditures(system: DemandSystem, moments: MomentForm): DemandSystem {
  return {
    ...system,
    moments,
    start: (size, means) => {
      const total = means.reduce((sum, mean) => sum + mean, 0);
      return system.start(
        size,
        means.map((mean) => mean / total),
      );
    },
  };
}
