import type { SystemFinding } from "../../../../shared/schemas/system.ts";
import type { RunControl } from "../../run.ts";
import type { MomentSource } from "../moment-source.ts";
import { firstStepsOf } from "./asked.ts";
import { type ExtendedFit, endogeneityOf } from "./endogeneity.ts";
import { zerosOf } from "./zeros.ts";

/** What a finding says of its first steps; nothing where there are none. `sourceAt` are the rows at the solution. */
export function firstStepFindings(
  fit: ExtendedFit,
  sourceAt: () => MomentSource,
  control: RunControl,
): Pick<SystemFinding, "endogeneity" | "zeros"> {
  const { instruments, participation } = firstStepsOf(fit.specification) ?? {};
  return {
    ...(instruments && { endogeneity: endogeneityOf(fit, instruments, control) }),
    ...(participation && { zeros: zerosOf(fit, participation, sourceAt()) }),
  };
}
