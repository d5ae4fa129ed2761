import type { ElasticitiesFinding } from "../../../shared/schemas/elasticities.ts";
import { type ByGood, byGood, type OneEstimate } from "../../../shared/tables/elasticities.ts";

/** More lines than these are no figure: then the chosen group alone is drawn. */
const MOST_LINES = 72;
const LANE = 13;
const AROUND = 11;

export interface IntervalLine {
  readonly key: string;
  readonly y: number;
  readonly one: OneEstimate;
  readonly isChosen: boolean;
}

/** A good's rows: its name's height, and where it begins. */
export interface IntervalRow {
  readonly good: string;
  readonly y: number;
  readonly top: number;
}

export interface IntervalLayout {
  readonly lines: IntervalLine[];
  readonly rows: IntervalRow[];
  readonly height: number;
  /** The axis: all intervals, the bound if it is near, and a little room. */
  readonly from: number;
  readonly to: number;
}

export function intervalLayout(
  { goods, groups }: Pick<ElasticitiesFinding, "goods" | "groups">,
  which: ByGood,
  chosen: number,
  bound: number,
): IntervalLayout {
  const all = groups.map((group, g) => ({ group, isChosen: g === chosen }));
  const drawn = goods.length * groups.length > MOST_LINES ? all.filter(({ isChosen }) => isChosen) : all;
  const tall = (drawn.length - 1) * LANE + 2 * AROUND;
  const lines = goods.flatMap((good, i) =>
    drawn.map(({ group, isChosen }, lane) => ({
      key: `${good} ${group.name}`,
      y: i * tall + AROUND + lane * LANE,
      one: byGood(group, which, i),
      isChosen,
    })),
  );
  const rows = goods.map((good, i) => ({ good, top: i * tall, y: i * tall + tall / 2 }));
  const low = Math.min(...lines.map(({ one }) => one.low));
  const high = Math.max(...lines.map(({ one }) => one.high));
  const span = high - low || 1;
  const near = bound > low - span / 2 && bound < high + span / 2 ? [bound] : [];
  const room = 0.06 * span;
  return {
    lines,
    rows,
    height: goods.length * tall,
    from: Math.min(low, ...near) - room,
    to: Math.max(high, ...near) + room,
  };
}
