import type { ElasticitiesFinding } from "../schemas/elasticities.ts";
import type { UnconditionalFormula } from "../schemas/two-stage.ts";
import { capital } from "./phrases.ts";
import type { ReferenceKey } from "./references.ts";

/** Where each formula is from. */
export const FORMULA_SOURCES: Readonly<Record<UnconditionalFormula, ReferenceKey>> = {
  "carpentier guyomard": "carpentierGuyomard2001",
  edgerton: "edgerton1997",
};

interface Conditional {
  readonly conditionalOn?: string;
}

/** "conditional on food expenditure": of a system whose total is what is spent on one group; "" of a whole budget. */
export function conditionalWords({ conditionalOn }: Conditional): string {
  return conditionalOn === undefined ? "" : `conditional on ${conditionalOn} expenditure`;
}

/** The same behind a heading, a title or the name of a number: ", conditional on food expenditure". */
export function conditionally(finding: Conditional): string {
  const words = conditionalWords(finding);
  return words && `, ${words}`;
}

/**
 * A finding whose tables are those of its unconditional elasticities: they take the place of the conditional ones, and
 * `conditionalOn` goes. Undefined where no broader system was named.
 */
export function unconditionalOf(finding: ElasticitiesFinding): ElasticitiesFinding | undefined {
  const { unconditional, conditionalOn: _, ...rest } = finding;
  if (unconditional === undefined) return undefined;
  const { shares, expenditure, uncompensated, compensated, classes, net, gross } = unconditional;
  const [group] = finding.groups;
  const own = { shares, expenditure, uncompensated, compensated, classes, net, gross };
  return { ...rest, unconditional, groups: [{ ...group, ...own }] };
}

/** Whether what a finding shows is unconditional, in place of what it had at first. */
export function isUnconditional({ conditionalOn, unconditional }: ElasticitiesFinding): boolean {
  return unconditional !== undefined && conditionalOn === undefined;
}

/** "Unconditional elasticities", "Elasticities": how a title begins. */
export function titled(finding: ElasticitiesFinding, what: string): string {
  return capital(isUnconditional(finding) ? `unconditional ${what}` : what);
}

/** What the file of a table begins with, so that those of both stages lie beside each other. */
export function filePrefix(finding: ElasticitiesFinding): string {
  if (isUnconditional(finding)) return "unconditional-";
  return finding.unconditional === undefined ? "" : "conditional-";
}
