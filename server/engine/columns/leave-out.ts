import { LEFT_OUT_REASONS, type RowAccounting } from "../../../shared/schemas/data.ts";
import { listWords } from "../../../shared/study/words.ts";
import type { DerivedColumns } from "./derive-columns.ts";
import type { FormedGood } from "./form-goods.ts";
import type { Roles } from "./resolve-roles.ts";
import { type Ground, keepGrounds, missingGrounds, purchaseGrounds, type Reason } from "./row-grounds.ts";

const MOST_ROWS_NAMED = 200;
const SLICES = 100;

export interface LeftOut {
  /** 0 for a row used, else one more than the place of its reason in `LEFT_OUT_REASONS`. */
  readonly reasonOf: Uint8Array;
  readonly accounting: RowAccounting;
}

/** Count every row under the first reason that applies, in the order of `LEFT_OUT_REASONS`. */
export function leaveOut(
  rows: number,
  goods: readonly FormedGood[],
  roles: Roles,
  { derived, keep, columns }: DerivedColumns,
): LeftOut {
  const grounds = [
    ...(keep ? keepGrounds(keep.values) : []),
    ...missingGrounds(goods, roles, { derived, keep, columns }),
    ...purchaseGrounds(goods, roles, rows),
  ];
  const reasonOf = new Uint8Array(rows);
  const leftOut: RowAccounting["leftOut"] = [];
  LEFT_OUT_REASONS.forEach((reason, place) => {
    const own = grounds.filter((ground) => ground.reason === reason);
    const concerned = new Set<Ground>();
    for (const ground of own) {
      for (let row = 0; row < rows; row++) {
        if ((reasonOf[row] !== 0 && reasonOf[row] !== place + 1) || !ground.applies(row)) continue;
        reasonOf[row] = place + 1;
        concerned.add(ground);
      }
    }
    if (concerned.size === 0) return;
    const label = keep && reason === "keep" ? `Left out by keep: ${keep.source}` : labelOf(reason, [...concerned]);
    leftOut.push({ reason, label, ...whereIn(reasonOf, place + 1) });
  });
  const used = rows - leftOut.reduce((sum, { count }) => sum + count, 0);
  return { reasonOf, accounting: { uploaded: rows, leftOut, used } };
}

function whereIn(reasonOf: Uint8Array, code: number) {
  const rows: number[] = [];
  const strip: number[] = new Array(SLICES).fill(0);
  let count = 0;
  for (let row = 0; row < reasonOf.length; row++) {
    if (reasonOf[row] !== code) continue;
    count++;
    if (rows.length < MOST_ROWS_NAMED) rows.push(row + 1);
    strip[Math.floor((row * SLICES) / reasonOf.length)]++;
  }
  return { count, rows, strip };
}

/** What the grounds have in common, and the columns while they are few enough to name. */
function labelOf(reason: Reason, grounds: readonly Ground[]): string {
  const faults = new Set(grounds.map(({ fault }) => fault));
  const general: Record<Reason, string> = {
    keep: "by keep",
    "missing value": "a value missing",
    "weight not positive": "a weight of zero or below",
    "price not positive": "a price of zero or below",
    "negative purchase": "a negative purchase",
    "total not positive": "bought nothing",
    "shares do not sum to one": "goods do not sum to the total",
  };
  const fault = faults.size === 1 ? [...faults][0] : general[reason];
  const columns = [...new Set(grounds.map(({ column }) => column))].filter((column) => column !== "");
  const where = columns.length > 0 && columns.length <= 3 ? ` in ${listWords(columns)}` : "";
  const because = grounds.flatMap((ground) => (ground.because ? [ground.because] : []));
  return `Left out: ${fault}${where}${because.length > 0 ? ` (${because.join("; ")})` : ""}`;
}
