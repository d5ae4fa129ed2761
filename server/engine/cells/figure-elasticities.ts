import type { EstimatesByPrice } from "../../../shared/schemas/elasticities.ts";
import type { Estimates } from "../../../shared/schemas/price-change.ts";
import { runElasticities } from "./elasticities.ts";
import type { AskedOfSystem, DrawnWith } from "./figure-asked.ts";

/** The elasticities of an elasticities cell that asks the same: at one point, or at the mean point of each group. */
export function elasticitiesDrawn({ specification, goods, system, data, control }: AskedOfSystem): DrawnWith {
  const { at, groups, level } = specification;
  const finding = runElasticities(
    {
      kind: "elasticities",
      system: specification.system ?? "",
      ...(at !== undefined && { at }),
      ...(groups && { groups }),
      over: "means",
      shares: "predicted",
      index: "held",
      level,
    },
    system,
    data,
    control,
  );
  return {
    intervals: finding.intervals,
    ...(!groups && { pointName: finding.groups[0].name }),
    drawn: {
      show: "elasticities",
      goods: goods.map((i) => finding.goods[i]),
      ...(groups && { groupedBy: groups }),
      groups: finding.groups.map(({ name, rows, total, expenditure, uncompensated, compensated }) => ({
        name,
        ...(rows !== undefined && { rows }),
        total,
        expenditure: chosen(expenditure, goods),
        own: ownPrice(uncompensated, goods),
        ownCompensated: ownPrice(compensated, goods),
      })),
      without: finding.without,
    },
  };
}

function chosen({ values, errors, low, high }: Estimates, goods: readonly number[]): Estimates {
  const [value, error, from, to] = [values, errors, low, high].map((all) => goods.map((i) => all[i]));
  return { values: value, errors: error, low: from, high: to };
}

function ownPrice({ values, errors, low, high }: EstimatesByPrice, goods: readonly number[]): Estimates {
  const [value, error, from, to] = [values, errors, low, high].map((all) => goods.map((i) => all[i][i]));
  return { values: value, errors: error, low: from, high: to };
}
