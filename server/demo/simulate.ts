import { type Random, seededRandom } from "../../shared/numerics/random.ts";
import { type SurveyRow, surveyCsv } from "./velmark-csv.ts";
import {
  drawHousehold,
  drawMembers,
  drawVillages,
  drawVisits,
  type Household,
  type Visit,
} from "./velmark-households.ts";
import { missingPrice, placeTroubles, type Trouble } from "./velmark-troubles.ts";
import { trueShares, VELMARK_GOODS, velmarkTruth } from "./velmark-truth.ts";

export const SURVEY_NAME = "purchases-2031.csv";
const SEED = 20_310_302;

/** Crowns a kilogram, sweet drinks a litre. */
const PRICES = [6.2, 9.1, 7.4, 31, 4.8, 12];
/** What prices rise in a year, beside the seasons. */
const RISE = [0.02, 0.015, 0.025, 0.02, 0.03, 0.02];
const SEASONS = [0.01, 0.01, 0.05, 0.01, -0.03, 0.01];
/** Standard deviations of what a household's share differs by from the system's, before adding-up. */
const TASTES = [0.066, 0.041, 0.046, 0.064, 0.036, 0.048];

/**
 * The Velmark Household Purchases Survey as the text of a CSV: invented households of an invented country, weekly
 * purchases simulated from `velmarkTruth` with a fixed seed, and the usual troubles of a survey. `tastes` scales what
 * households differ by: at one, some buy no sweet drinks, which the system itself does not know of; at a half, none.
 */
export function simulateSurvey({ seed = SEED, tastes = 1 }: { seed?: number; tastes?: number } = {}): string {
  const random = seededRandom(seed);
  const visits = drawVisits(random, drawVillages(random, VELMARK_GOODS.length));
  const { households, troubles } = drawHouseholds(random, visits);
  const prices = drawPrices(random, visits, households);
  const sound = households.map((_, row) => !troubles.has(row));
  const totals = households.map(({ logTotal }) => Math.round(100 * Math.exp(logTotal)) / 100);
  // The system is true in units of the sample means of the rows that can be used, as estimation will form them.
  const weights = households.map(({ weight }) => weight);
  const totalScale = meanOf(totals, weights, sound);
  const priceScale = PRICES.map((_, i) =>
    meanOf(
      prices.map((row) => row[i]),
      weights,
      sound,
    ),
  );
  const truth = velmarkTruth();
  const rows = households.map((household, row): SurveyRow => {
    const logPrices = prices[row].map((price, i) => Math.log(price / priceScale[i]));
    const logTotal = Math.log(totals[row] / totalScale);
    const { urban } = household.visit.village;
    const predicted = trueShares(truth, logPrices, logTotal, Math.log(household.members), urban);
    const shares = addTaste(random, predicted, tastes);
    return trouble(troubles.get(row), row, {
      household,
      prices: prices[row],
      spent: shares.map((share) => share * totals[row]),
    });
  });
  return surveyCsv(rows);
}

function drawHouseholds(random: Random, visits: readonly Visit[]) {
  const villageOfRow = visits.flatMap(({ village, households }) => new Array<number>(households).fill(village.number));
  const troubles = placeTroubles(random, villageOfRow);
  const households: Household[] = [];
  let number = 0;
  for (const visit of visits) {
    if (visit.village !== households.at(-1)?.visit.village) number = 0;
    for (let place = 0; place < visit.households; place++) {
      const isLarge = troubles.get(households.length) === "large household";
      const members = isLarge ? 13 + random.integer(5) : drawMembers(random);
      households.push(drawHousehold(random, visit, ++number, members));
    }
  }
  return { households, troubles };
}

/** Country, village, visit and household each have their part in a price; prices are printed to the cent. */
function drawPrices(random: Random, visits: readonly Visit[], households: readonly Household[]): number[][] {
  const ofVisit = new Map(visits.map((visit) => [visit, PRICES.map(() => 0.05 * random.normal())]));
  return households.map(({ visit }) =>
    PRICES.map((price, i) => {
      const years = (visit.month - 18.5) / 12;
      const season = SEASONS[i] * Math.cos((2 * Math.PI * (visit.month - 1)) / 12);
      const local = visit.village.prices[i] + ofVisit.get(visit)![i] + 0.06 * random.normal();
      return Math.round(100 * price * Math.exp(RISE[i] * years + season + local)) / 100;
    }),
  );
}

function meanOf(values: readonly number[], weights: readonly number[], counts: readonly boolean[]): number {
  let sum = 0;
  let total = 0;
  values.forEach((value, row) => {
    if (!counts[row]) return;
    sum += weights[row] * value;
    total += weights[row];
  });
  return sum / total;
}

/** Tastes that add up to nothing; a share that would fall below zero is a good not bought. */
function addTaste(random: Random, shares: readonly number[], scale: number): number[] {
  const drawn = TASTES.map((deviation) => scale * deviation * random.normal());
  const surplus = drawn.reduce((sum, taste) => sum + taste, 0);
  const variance = TASTES.reduce((sum, deviation) => sum + deviation ** 2, 0);
  const tasted = shares.map((share, i) => Math.max(0, share + drawn[i] - (surplus * TASTES[i] ** 2) / variance));
  const sum = tasted.reduce((total, share) => total + share, 0);
  return tasted.map((share) => share / sum);
}

function trouble(kind: Trouble | undefined, row: number, sound: SurveyRow): SurveyRow {
  switch (kind) {
    case "price missing":
      return { ...sound, missingPrice: missingPrice(sound.household, row, VELMARK_GOODS.length) };
    case "dairy price zero":
      return { ...sound, prices: sound.prices.map((price, i) => (i === 1 ? 0 : price)) };
    case "bought nothing":
      return { ...sound, spent: sound.spent.map(() => 0) };
    case "does not add up":
      return { ...sound, totalMisprint: 1.1 };
    default:
      return sound;
  }
}
