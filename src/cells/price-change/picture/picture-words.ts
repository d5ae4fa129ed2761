import type { Compensation, OnePrice } from "../../../../shared/economics/price-change/one-price.ts";
import { capital } from "../../../../shared/study/words.ts";
import { DECIMALS, printFixed } from "../../../../shared/tables/numbers.ts";
import type { Frame } from "./frame.ts";

const money = (value: number) => printFixed(value, DECIMALS.money);

/** What the picture says of itself: the sentences above it, and the one it is read aloud by. */
export function pictureWords(
  { good, budgets, noCurves, compensation }: OnePrice,
  { isCut, curveEnds }: Pick<Frame, "isCut" | "curveEnds">,
  by: Compensation,
): { notes: string[]; label: string } {
  const [before, after] = [budgets.before.price, budgets.after.price];
  const what =
    before === after
      ? `The price of ${good} stays at ${money(before)}: there is one budget.`
      : `Only its own price moves here, from ${money(before)} to ${money(after)}.`;
  const notes = [
    [what, ...(isCut ? ["The axes do not begin at 0."] : [])].join(" "),
    ...(noCurves === undefined ? [] : [`No indifference curves: ${noCurves}. Budgets and bundles alone are drawn.`]),
    ...(curveEnds
      ? ["A curve ends where no preferences are behind the system: compensated demand stops falling with the price."]
      : []),
  ];
  const kept =
    compensation === undefined || before === after
      ? ""
      : by === "hicks"
        ? ` Keeping the utility before costs ${money(compensation)} more.`
        : ` Keeping the bundle before affordable costs ${money(compensation)} more.`;
  return {
    notes,
    label: `${capital(good)} against everything else. ${what}${kept} The numbers are in the table that follows.`,
  };
}
