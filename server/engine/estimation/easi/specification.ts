import type { SystemSpecification } from "../../../../shared/schemas/system.ts";
import type { EasiSize } from "../../../../shared/systems/demand-system.ts";

const DEFAULT_DEGREE = 3;

/** Degree and interactions of a specification of EASI, in the order of the schema's names. */
export function easiSizeOf({ degree, interactions = [] }: SystemSpecification): EasiSize {
  return { degree: degree ?? DEFAULT_DEGREE, interactions: [...new Set(interactions)].sort() };
}

/** Whether y is the implicit utility, which depends on θ and on the shares themselves. */
export function isExactEasi(specification: SystemSpecification): boolean {
  return specification.form === "easi" && (specification["real expenditure"] ?? "exact") === "exact";
}
