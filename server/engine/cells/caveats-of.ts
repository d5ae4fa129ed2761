import { CAVEATS, type Caveats } from "../../../shared/schemas/caveats.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";

/** What elasticities and matrices of the system take over from it; empty of one estimated in one step. */
export function caveatsOf({
  zeros,
  endogeneity,
  conditionalOn,
}: Pick<SystemFinding, "zeros" | "endogeneity" | "conditionalOn">): { caveats?: Caveats } {
  const holds: Record<(typeof CAVEATS)[number], boolean> = {
    "latent shares": zeros !== undefined,
    "first step as given": zeros?.firstStepIgnored === true,
    "conditional on a group": conditionalOn !== undefined,
    "first stage as given": endogeneity?.firstStageIgnored === true,
  };
  const caveats = CAVEATS.filter((caveat) => holds[caveat]);
  return caveats.length > 0 ? { caveats } : {};
}
