import type { FigureFinding } from "../../../shared/schemas/figure.ts";
import { fitColumns } from "./drawings/fit.ts";

const BAND = 300;
const OPENED = 440;
/** Of a line of panels. */
const PANEL = 220;
/** Of a line of elasticities, one for each good and group, and of what stands above and below them. */
const LINE = 15;
const GOOD = 12;
const AROUND = 92;

/** How many pixels a figure is high: as many as its marks need, and more of them where it is opened. */
export function figureHeight(
  { drawn }: FigureFinding,
  { opened, narrow }: { opened: boolean; narrow: boolean },
): number {
  const least = opened ? OPENED : BAND;
  if (drawn.show === "fit of shares") {
    return Math.max(least, PANEL * Math.ceil(drawn.goods.length / fitColumns(drawn.goods.length, narrow)));
  }
  if (drawn.show !== "elasticities") return least;
  const panel = drawn.goods.length * (GOOD + LINE * drawn.groups.length) + AROUND;
  return narrow ? 3 * panel : Math.max(opened ? 320 : 240, panel);
}
