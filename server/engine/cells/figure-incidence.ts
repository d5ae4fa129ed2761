import type { Incidence, IncidenceGroup, PriceChangeFinding } from "../../../shared/schemas/price-change.ts";
import { Refusal } from "../refusal.ts";
import type { DrawnWith } from "./figure-asked.ts";

/** Who bears a price change, as its own cell found it: the loss by group, of expenditure and in money. */
export function incidenceDrawn({ incidence, noIncidence, standardErrors }: PriceChangeFinding): DrawnWith {
  if (incidence === undefined) {
    throw refusal(`The price change has no incidence: ${noIncidence ?? "it was not asked for."}`);
  }
  if (incidence.groupedBy === undefined) {
    throw refusal(
      "The price change parts its rows into no groups: give it some, as in groups: {of: total expenditure, quantiles: 5}.",
    );
  }
  if (incidence.groups.length === 0) {
    throw refusal(`The price change is defined in none of its groups: ${incidence.without[0].undefined}`);
  }
  // One measure for all, so that groups can be compared.
  const exact = [...incidence.groups, incidence.all].every(({ welfare }) => welfare !== undefined);
  return {
    intervals: "normal",
    standardErrors,
    drawn: {
      show: "incidence",
      measure: exact ? "compensating variation" : "second order",
      groupedBy: incidence.groupedBy,
      groups: incidence.groups.map((group) => bearer(group, exact)),
      all: bearer(incidence.all, exact),
      without: incidence.without,
      notDefined: rowsWithout(incidence),
    },
  };
}

function bearer(group: IncidenceGroup, exact: boolean) {
  const { name, rows, weightShare, welfare, welfareShare, secondOrder, secondOrderShare } = group;
  return {
    name,
    rows,
    weightShare,
    share: (exact && welfareShare?.compensating) || secondOrderShare,
    amount: (exact && welfare?.compensating) || secondOrder,
  };
}

function rowsWithout({ groups, without }: Incidence): number {
  return (
    groups.reduce((sum, { notDefined }) => sum + (notDefined?.rows ?? 0), 0) +
    without.reduce((sum, { rows }) => sum + rows, 0)
  );
}

const refusal = (sentence: string) => new Refusal([{ sentence, key: ["price change"] }]);
