import { UNCONDITIONAL_FORMULAS, type UnconditionalFormula } from "../schemas/two-stage.ts";
import type { ResolvedCell } from "./resolve.ts";

/** The formulas by which a study's elasticities cells take a system's elasticities to unconditional ones, each once. */
export function formulasUsedOn(
  system: string,
  cells: readonly Pick<ResolvedCell, "specification">[],
): UnconditionalFormula[] {
  const used = new Set(
    cells.flatMap(({ specification }) =>
      specification?.kind === "elasticities" && specification.system === system && specification.within !== undefined
        ? [specification.unconditional ?? "carpentier guyomard"]
        : [],
    ),
  );
  return UNCONDITIONAL_FORMULAS.filter((formula) => used.has(formula));
}
