import type { Value } from "../../../shared/study/edit.ts";

/** Which kind of point a source's `at` names, whatever else is still wrong with it. */
export type PointChoice = "base point" | "mean" | "quantile" | "row" | "own";

export function pointChoice(at: unknown): PointChoice {
  if (at === "mean") return "mean";
  if (typeof at !== "object" || at === null) return "base point";
  if ("prices" in at) return "own";
  if ("row" in at) return "row";
  return "x" in at && typeof at.x === "number" ? "own" : "quantile";
}

/** What `at` is written as when a kind of point is chosen, before its own field is filled in. */
export function newPoint(choice: PointChoice, goods: readonly string[]): Value {
  switch (choice) {
    case "row":
      return { row: 1 };
    case "quantile":
      return { x: "quantile 0.5" };
    case "own":
      return { prices: Object.fromEntries(goods.map((good) => [good, 1])), x: 1 };
    default:
      return choice;
  }
}
