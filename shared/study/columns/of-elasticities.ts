import { type ElasticitiesSpecification, TOTAL_EXPENDITURE } from "../../schemas/elasticities.ts";
import type { Problem } from "../../schemas/problem.ts";
import { groupProblems } from "./of-groups.ts";
import { priceProblems } from "./of-prices.ts";
import { type Context, noGood, teller } from "./tell.ts";

/** Prices and groups, an index the system does not have, and a broader system that is none. */
export function elasticitiesProblems(specification: ElasticitiesSpecification, context: Context): Problem[] {
  const { at, groups, index, system: name } = specification;
  const tell = teller(context.places);
  const system = context.specifications.get(name);
  const problems = at === undefined ? [] : priceProblems(at, name, context);
  if (system?.kind === "system" && index === "exact" && (system.form !== "la-aids" || system.index !== "stone")) {
    const found = system.form === "la-aids" ? `la-aids with ${system.index ?? "tornqvist"}` : system.form;
    problems.push(
      tell(
        ["index"],
        `exact lets the weights of Stone's index in la-aids move; ${name} is ${found}. Write held.`,
        "held",
      ),
    );
  }
  problems.push(...withinProblems(specification, context));
  const data = system?.kind === "system" ? context.specifications.get(system.data) : undefined;
  return data?.kind === "data" ? [...problems, ...groupProblems(groups, data, context, [TOTAL_EXPENDITURE])] : problems;
}

/** A broader system that does not have the group as a good, is the group's own, or is of a group itself. */
function withinProblems(specification: ElasticitiesSpecification, context: Context): Problem[] {
  const { system: name, within, as } = specification;
  if (within === undefined || as === undefined) return [];
  const tell = teller(context.places);
  if (within === name) return [tell(["within"], `within names a broader system than ${name} itself.`)];
  const [own, broader] = [context.specifications.get(name), context.specifications.get(within)];
  if (own?.kind !== "system" || broader?.kind !== "system") return [];
  const problems: Problem[] = [];
  const group = own["conditional on"];
  if (group !== undefined && group !== as) {
    problems.push(tell(["as"], `${name} is conditional on ${group}, and as names ${as}: they are one group.`, group));
  }
  const whole = broader["conditional on"];
  if (whole !== undefined) {
    problems.push(
      tell(["within"], `${within} is itself conditional on ${whole}: name the system of the whole budget.`),
    );
  }
  const data = context.specifications.get(broader.data);
  if (data?.kind === "data" && !Object.hasOwn(data.goods, as)) {
    problems.push(tell(["as"], ...noGood(broader.data, as, Object.keys(data.goods))));
  }
  return problems;
}
