import type { Random } from "../../shared/numerics/random.ts";
import { type Household, SPOILED_VISIT } from "./velmark-households.ts";

/** What is wrong with a row of the survey, as in any survey. */
export type Trouble = "large household" | "price missing" | "bought nothing" | "dairy price zero" | "does not add up";

const SCATTERED: Readonly<Record<Exclude<Trouble, "dairy price zero">, number>> = {
  "large household": 63,
  "price missing": 12,
  "bought nothing": 12,
  "does not add up": 3,
};
/** Prices of meat that were not written down in the spoiled visit. */
const SPOILED_PRICES = 29;
/** Villages in which some prices of dairy were entered as zero, and how many. */
const ZERO_PRICES: readonly (readonly [village: number, rows: number])[] = [
  [24, 4],
  [176, 3],
];

/** At most one trouble a row: by the row's place in the file. */
export function placeTroubles(random: Random, villageOfRow: readonly number[]): Map<number, Trouble> {
  const troubles = new Map<number, Trouble>();
  const rowsOf = (village: number) => villageOfRow.flatMap((one, row) => (one === village ? [row] : []));
  for (const row of rowsOf(SPOILED_VISIT.village).slice(4, 4 + SPOILED_PRICES)) troubles.set(row, "price missing");
  for (const [village, rows] of ZERO_PRICES) {
    for (const row of rowsOf(village).slice(2, 2 + rows)) troubles.set(row, "dairy price zero");
  }
  for (const [trouble, count] of Object.entries(SCATTERED) as [Trouble, number][]) {
    for (let placed = 0; placed < count; ) {
      const row = random.integer(villageOfRow.length);
      if (troubles.has(row) || villageOfRow[row] === SPOILED_VISIT.village) continue;
      troubles.set(row, trouble);
      placed++;
    }
  }
  return troubles;
}

/** The price of which good is missing: meat in the spoiled visit, any elsewhere. */
export function missingPrice(household: Household, row: number, goods: number): number {
  return household.visit.village.number === SPOILED_VISIT.village ? 3 : row % goods;
}
