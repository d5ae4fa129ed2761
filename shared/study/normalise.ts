import type { CellSpecification } from "../schemas/cell.ts";
import { HYPOTHESIS_NAMES } from "../schemas/tests.ts";
import { RESTRICTION_NAMES } from "../systems/names.ts";

/**
 * One specification for every way of writing the same question: restrictions once each in their own
 * order (hypotheses too), the default index of la-aids said. Defaults of the schema are already filled in.
 */
export function normaliseSpecification(specification: CellSpecification): CellSpecification {
  if (specification.kind === "tests" && specification.of) {
    const { of } = specification;
    return { ...specification, of: HYPOTHESIS_NAMES.filter((name) => of.includes(name)) };
  }
  if (specification.kind === "elasticities" && specification.within !== undefined) {
    return { ...specification, unconditional: specification.unconditional ?? "carpentier guyomard" };
  }
  if (specification.kind !== "system") return specification;
  return {
    ...specification,
    ...(specification.form === "la-aids" && { index: specification.index ?? "tornqvist" }),
    impose: RESTRICTION_NAMES.filter((name) => specification.impose.includes(name)),
  };
}
