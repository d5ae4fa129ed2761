import { TOTAL_EXPENDITURE } from "../../schemas/elasticities.ts";
import type { FigureSpecification } from "../../schemas/figure.ts";
import type { Problem } from "../../schemas/problem.ts";
import { groupProblems } from "./of-groups.ts";
import { priceProblems } from "./of-prices.ts";
import { type Context, MOST_TOLD, noGood, teller } from "./tell.ts";

/** Goods that are not there, columns of groups, and prices of one's own. */
export function figureProblems(specification: FigureSpecification, context: Context): Problem[] {
  const { at, groups, goods: named = [], system: name } = specification;
  const change = context.specifications.get(specification["price change"] ?? "");
  const system = context.specifications.get(change?.kind === "price change" ? change.system : (name ?? ""));
  const owner = system?.kind === "system" ? system.data : (specification.data ?? "");
  const data = context.specifications.get(owner);
  if (data?.kind !== "data") return [];
  const tell = teller(context.places);
  const goods = Object.keys(data.goods);
  const problems = named.flatMap((good, i) =>
    goods.includes(good)
      ? []
      : [
          tell(
            ["goods", i],
            ...noGood(
              owner,
              good,
              goods.filter((other) => !named.includes(other)),
            ),
          ),
        ],
  );
  return [
    ...problems.slice(0, MOST_TOLD),
    ...(at === undefined ? [] : priceProblems(at, name ?? "", context)),
    ...groupProblems(groups, data, context, [TOTAL_EXPENDITURE]),
  ];
}
