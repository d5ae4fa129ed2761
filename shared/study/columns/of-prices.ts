import type { Problem } from "../../schemas/problem.ts";
import type { SlutskySpecification } from "../../schemas/slutsky.ts";
import { counted, listWords } from "../words.ts";
import { type Context, MOST_TOLD, noGood, teller } from "./tell.ts";

/** Prices of one's own at which a system is evaluated: a price for each of its goods and no other. */
export function priceProblems(at: SlutskySpecification["at"], systemName: string, context: Context): Problem[] {
  if (typeof at === "string" || !("prices" in at)) return [];
  const tell = teller(context.places);
  const system = context.specifications.get(systemName);
  const data = system?.kind === "system" ? context.specifications.get(system.data) : undefined;
  if (system?.kind !== "system" || data?.kind !== "data") return [];
  const goods = Object.keys(data.goods);
  const priced = Object.keys(at.prices);
  const known = new Set(goods);
  const problems: Problem[] = priced
    .filter((good) => !known.has(good))
    .slice(0, MOST_TOLD)
    .map((good) => {
      const [sentence, nearest] = noGood(
        system.data,
        good,
        goods.filter((other) => !priced.includes(other)),
      );
      const place = context.places.key(["at", "prices", good]);
      return { sentence, key: ["at", "prices", good], ...(place && { place }), ...(nearest && { nearest }) };
    });
  const without = goods.filter((good) => !priced.includes(good));
  if (problems.length === 0 && without.length > 0) {
    problems.push(
      tell(
        ["at", "prices"],
        `prices has ${counted(priced.length, "good")}, the system has ${counted(goods.length, "good")}: ${listWords(without)} ${without.length === 1 ? "has" : "have"} no price.`,
      ),
    );
  }
  return problems;
}
