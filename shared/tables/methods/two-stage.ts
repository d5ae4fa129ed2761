import { citedInText } from "../cite.ts";
import { FORMULA_SOURCES } from "../conditional.ts";
import { listed } from "../phrases.ts";
import { type MethodsParts, type Said, said } from "./parts.ts";

/** That the system is of one group, and how its elasticities are taken to those of the whole budget. */
export function twoStageSentences({ specification, unconditional = [] }: MethodsParts): Said[] {
  const group = specification["conditional on"];
  const conditional =
    group === undefined
      ? []
      : [said(`The goods are those of ${group}: what the system says is conditional on ${group} expenditure.`)];
  if (unconditional.length === 0) return conditional;
  const sources = unconditional.map((formula) => FORMULA_SOURCES[formula]);
  const sentence = `Unconditional elasticities follow from those of the group as one good of a broader system by the formulas of ${listed(sources.map(citedInText))}.`;
  return [...conditional, said(sentence, sources)];
}
