import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { Refusal, unlessRefused } from "../refusal.ts";
import { NotConverged } from "./failures.ts";

/** Estimates and, where an iteration does not end that a change of units would shorten, says in the refusal what to try. */
export function advising<T>(
  { form, alpha0 }: Pick<SystemSpecification, "form" | "alpha0">,
  { finding }: Pick<PreparedData, "finding">,
  estimate: () => T,
): T {
  return unlessRefused(estimate, (refusal) => {
    if (form !== "quaids" || !(refusal instanceof NotConverged)) throw refusal;
    const tried = `alpha0 is ${alpha0}`;
    const sentence =
      finding.normalise === "mean"
        ? `${refusal.message} Another alpha0 may let it converge (${tried}): one a little below the lowest ln x in the sample.`
        : `${refusal.message} Prices and expenditure are not normalised: try normalise: mean in the data cell, or another alpha0 (${tried}), such as one a little below the lowest ln x in the sample.`;
    throw new Refusal(sentence);
  });
}
