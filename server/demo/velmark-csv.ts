import type { Household } from "./velmark-households.ts";

export interface SurveyRow {
  readonly household: Household;
  readonly prices: readonly number[];
  /** By good, before rounding to what is written down. */
  readonly spent: readonly number[];
  readonly missingPrice?: number;
  /** By how much the total written down differs from the sum. */
  readonly totalMisprint?: number;
}

const KEYS = ["grains", "dairy", "produce", "meat", "sweet", "other"];
/** Goods of which the survey wrote down how much was bought, not what was paid. */
const BY_QUANTITY: ReadonlySet<string> = new Set(["produce", "sweet"]);
const LITRES_IN_A_BOTTLE = 0.75;

/** The survey as it would be delivered; the total has four decimals, since cents times hundredths do. */
export function surveyCsv(rows: readonly SurveyRow[]): string {
  const lines = rows.map((row) => cellsOf(row));
  const header = lines[0].map(([name]) => name).join(",");
  return `${[header, ...lines.map((cells) => cells.map(([, cell]) => cell).join(","))].join("\n")}\n`;
}

type Cell = readonly [name: string, cell: string];
const whole = (name: string, value: number): Cell => [name, String(value)];

function cellsOf({ household, prices, spent, missingPrice, totalMisprint }: SurveyRow): Cell[] {
  const { visit, members, weight, headAge, headSchool, rooms, hasFridge } = household;
  const { village, month } = visit;
  const goods = KEYS.map((key, i) => purchase(key, prices[i], spent[i], missingPrice === i));
  const total = Math.round(goods.reduce((sum, good) => sum + good.tenThousandths, 0) * (totalMisprint ?? 1));
  return [
    ["household_id", household.id],
    whole("village", village.number),
    whole("month", month),
    ["survey_weight", weight.toFixed(1)],
    whole("members", members),
    whole("urban", village.urban),
    ...goods.flatMap(({ cells }) => cells),
    ["e_total", (total / 1e4).toFixed(4)],
    whole("head_age", headAge),
    whole("head_school", headSchool),
    whole("rooms", rooms),
    whole("has_fridge", hasFridge),
    ["region", village.region],
    whole("interview_day", household.interviewDay),
    whole("children", household.children),
    whole("earners", household.earners),
    whole("head_woman", household.headWoman),
    whole("owns_home", household.ownsHome),
    ["market_km", village.kilometresToMarket.toFixed(1)],
  ];
}

/** Reckoned in whole cents and hundredths, so that the total is the sum to the last digit printed. */
function purchase(key: string, price: number, spent: number, isMissing: boolean) {
  const cents = Math.round(100 * price);
  const price_: Cell = [`p_${key}`, isMissing ? "" : (cents / 100).toFixed(2)];
  if (!BY_QUANTITY.has(key)) {
    const paid = Math.round(100 * spent);
    return { cells: [price_, [`e_${key}`, (paid / 100).toFixed(2)] satisfies Cell], tenThousandths: 100 * paid };
  }
  const hundredths = Math.round((100 * spent) / price);
  const quantity = (hundredths / 100).toFixed(2);
  const bottles: Cell = ["q_sweet", (hundredths / 100 / LITRES_IN_A_BOTTLE).toFixed(2)];
  const cells: Cell[] = key === "sweet" ? [price_, bottles, ["q_sweet_l", quantity]] : [price_, [`q_${key}`, quantity]];
  return { cells, tenThousandths: cents * hundredths };
}
