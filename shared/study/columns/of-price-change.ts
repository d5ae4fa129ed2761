import { TOTAL_EXPENDITURE } from "../../schemas/elasticities.ts";
import { EXPENDITURE_PER_ADULT, type PriceChangeSpecification } from "../../schemas/price-change.ts";
import type { Problem } from "../../schemas/problem.ts";
import { uploadRead } from "../uploads.ts";
import { groupProblems } from "./of-groups.ts";
import { priceProblems } from "./of-prices.ts";
import { type Context, MOST_TOLD, noColumn, noGood, teller } from "./tell.ts";

/** Goods that are not there, and columns of groups and of needs. */
export function priceChangeProblems(specification: PriceChangeSpecification, context: Context): Problem[] {
  const { at, system: name, prices, groups, "equivalence scale": scale } = specification;
  const tell = teller(context.places);
  const system = context.specifications.get(name);
  const data = system?.kind === "system" ? context.specifications.get(system.data) : undefined;
  if (system?.kind !== "system" || data?.kind !== "data") return [];
  const goods = Object.keys(data.goods);
  const unknown = Object.keys(prices).filter((good) => !goods.includes(good));
  const problems = unknown.slice(0, MOST_TOLD).map((good): Problem => {
    const [sentence, nearest] = noGood(
      system.data,
      good,
      goods.filter((other) => !Object.hasOwn(prices, other)),
    );
    const place = context.places.key(["prices", good]);
    return { sentence, key: ["prices", good], ...(place && { place }), ...(nearest && { nearest }) };
  });
  const upload = uploadRead(context.uploads, data);
  const isRoot = typeof scale === "object";
  const column = isRoot ? scale["square root of"] : scale;
  if (upload !== undefined && column !== undefined) {
    const numeric = upload.columns.filter(({ type }) => type === "number").map((one) => one.name);
    const names = [...numeric, ...Object.keys(data.derive ?? {})];
    const path = isRoot ? ["equivalence scale", "square root of"] : ["equivalence scale"];
    if (!names.includes(column)) problems.push(tell(path, ...noColumn(system.data, column, names)));
  }
  return [
    ...priceProblems(at, name, context),
    ...problems,
    ...groupProblems(groups, data, context, [TOTAL_EXPENDITURE, EXPENDITURE_PER_ADULT]),
  ];
}
