import type { ElasticitiesFinding } from "../schemas/elasticities.ts";
import type { UnconditionalFinding } from "../schemas/two-stage.ts";
import { citedInText } from "./cite.ts";
import { FORMULA_SOURCES } from "./conditional.ts";
import { printPercent, printQuantity, printSize } from "./numbers.ts";
import { withArticle } from "./slutsky-matrix.ts";

/** What is spent on the group in the two data may differ by so much before it is said as a caution. */
const FAR_APART = 0.1;
/** Laws that hold but for rounding. */
const ROUNDING = 1e-8;

const HOLDS: Readonly<Record<UnconditionalFinding["formula"], string>> = {
  "carpentier guyomard":
    "exact under weak separability where the broader system's elasticities are those of a change of all the group's prices in one proportion",
  edgerton:
    "exact under weak separability only where every good of the group has an expenditure elasticity of 1 within it; elsewhere compensated effects are not symmetric",
};

/** How the unconditional elasticities came about and what they rest on, a sentence each. */
export function unconditionalNotes(told: UnconditionalFinding): string[] {
  return [howNote(told), errorsNote(told), priceNote(told), spentNote(told), ...lawsNotes(told)];
}

function howNote({ formula, group, form }: UnconditionalFinding): string {
  return `Unconditional elasticities by ${citedInText(FORMULA_SOURCES[formula])}, from those of the goods within ${group} and of ${group} as one good of a broader system (${form}): ${HOLDS[formula]}.`;
}

function errorsNote({ errors, standardErrors }: UnconditionalFinding): string {
  const broader = `The broader system's standard errors are ${standardErrors}`;
  return errors === "independent"
    ? `${broader}; the estimates of the two systems are taken as independent, and intervals as normal.`
    : `${broader}; both systems rest on the same rows, so that errors are the largest that any correlation between their estimates allows (the sum of what comes of each), and intervals normal.`;
}

function priceNote({ group }: UnconditionalFinding): string {
  return `The price of ${group} in the broader data is taken to move with the prices of its goods by their shares within it, as Stone's, Törnqvist's and Laspeyres's indices do at the point.`;
}

/** Both numbers; where they differ much, as a caution. */
function spentNote({ spent, group, pointName }: UnconditionalFinding): string {
  const at = withArticle(pointName);
  const numbers = `At ${at} ${printQuantity(spent.broader, "money")} is spent on ${group} by the broader system, and the total of the group's own data is ${printQuantity(spent.own, "money")}`;
  const apart = Math.abs(spent.broader / spent.own - 1);
  if (apart <= FAR_APART) return `${numbers}.`;
  return `${numbers}: they differ by ${printPercent(apart)}, so that the two systems are evaluated at different budgets.`;
}

function lawsNotes({ identities, formula }: UnconditionalFinding): string[] {
  const { symmetry, ...others } = identities;
  const missed = Math.max(...Object.values(others));
  const aggregation =
    missed <= ROUNDING
      ? "Engel's, Cournot's and homogeneity's sums agree with the group's own elasticities."
      : `Engel's, Cournot's or homogeneity's sums miss the group's own elasticities by up to ${printSize(missed)}, as far as the two systems miss them themselves.`;
  if (symmetry <= ROUNDING) return [aggregation];
  const why = formula === "edgerton" ? "as Edgerton's formula leaves it" : "as the group's own system does";
  return [aggregation, `Compensated effects miss symmetry by up to ${printSize(symmetry)}, ${why}.`];
}

/** "Unconditionally (Carpentier and Guyomard 2001), ": how the second half of the sentence begins. */
export function unconditionallyBy({ formula }: UnconditionalFinding): string {
  return `Unconditionally, by ${citedInText(FORMULA_SOURCES[formula])}`;
}

/** The caution beside a figure or in a band, where the two systems meet badly. */
export function meetsBadly({ unconditional }: ElasticitiesFinding): boolean {
  return unconditional !== undefined && Math.abs(unconditional.spent.broader / unconditional.spent.own - 1) > FAR_APART;
}
