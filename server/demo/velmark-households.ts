import type { Random } from "../../shared/numerics/random.ts";

/** Villages of the survey, and rows of the file. */
const VILLAGES = 212;
const HOUSEHOLDS = 4938;
/** The village of which one visit brought hardly a price of meat, and the month of that visit (March 2031). */
export const SPOILED_VISIT = { village: 131, month: 27, households: 36 };

export interface Village {
  readonly number: number;
  readonly region: string;
  readonly urban: number;
  readonly kilometresToMarket: number;
  /** Deviations of log prices from the country's, by good. */
  readonly prices: readonly number[];
  readonly prosperity: number;
}

export interface Visit {
  readonly village: Village;
  /** 1 is January 2029, 36 December 2031. */
  readonly month: number;
  readonly households: number;
}

const REGIONS = ["Coast", "Plain", "Hills", "Capital"];

export function drawVillages(random: Random, goods: number): Village[] {
  return Array.from({ length: VILLAGES }, (_, at) => {
    const urban = random.uniform() < 0.43 ? 1 : 0;
    const region = REGIONS[urban ? random.integer(4) : random.integer(3)];
    // What makes a village dear at all is shared by its goods, and is small beside what differs.
    const dear = 0.07 * random.normal();
    return {
      number: at + 1,
      region,
      urban,
      kilometresToMarket: Math.round((urban ? 2 : 9) * Math.exp(0.6 * random.normal()) * 10) / 10,
      prices: Array.from({ length: goods }, () => dear + 0.185 * random.normal()),
      prosperity: 0.14 * random.normal(),
    };
  });
}

/** Two or three visits to each village, in the order of the file; their households add up to those of the survey. */
export function drawVisits(random: Random, villages: readonly Village[]): Visit[] {
  const drawn = villages.flatMap((village) => {
    if (village.number === SPOILED_VISIT.village) {
      const { month, households } = SPOILED_VISIT;
      return [{ village, month, households }];
    }
    const months = new Set<number>();
    while (months.size < 2 + random.integer(2)) months.add(1 + random.integer(36));
    return [...months].sort((a, b) => a - b).map((month) => ({ village, month, households: 7 + random.integer(5) }));
  });
  let surplus = drawn.reduce((sum, { households }) => sum + households, 0) - HOUSEHOLDS;
  while (surplus !== 0) {
    const visit = drawn[random.integer(drawn.length)];
    const next = visit.households - Math.sign(surplus);
    if (visit.village.number === SPOILED_VISIT.village || next < 4) continue;
    visit.households = next;
    surplus -= Math.sign(surplus);
  }
  return drawn;
}

export interface Household {
  readonly id: string;
  readonly visit: Visit;
  readonly members: number;
  readonly children: number;
  readonly earners: number;
  readonly headAge: number;
  readonly headSchool: number;
  readonly headWoman: number;
  readonly rooms: number;
  readonly hasFridge: number;
  readonly ownsHome: number;
  readonly interviewDay: number;
  readonly weight: number;
  /** ln of what the household would spend on food in a week, before prices. */
  readonly logTotal: number;
}

export function drawHousehold(random: Random, visit: Visit, number: number, members: number): Household {
  const { urban, prosperity } = visit.village;
  const headAge = Math.round(Math.min(88, Math.max(18, 46 + 13 * random.normal())));
  const headSchool = Math.round(Math.min(18, Math.max(0, 8 + 2 * urban + 3.5 * random.normal())));
  const children = Math.min(members - 1, Math.floor(members * 0.75 * random.uniform()));
  const wealth = prosperity + 0.03 * (headSchool - 8) + 0.34 * random.normal();
  return {
    id: `${String(visit.village.number).padStart(3, "0")}-${String(number).padStart(2, "0")}`,
    visit,
    members,
    children,
    earners: Math.max(1, Math.round((members - children) * (0.4 + 0.3 * random.uniform()))),
    headAge,
    headSchool,
    headWoman: random.uniform() < 0.31 ? 1 : 0,
    rooms: Math.max(1, Math.round(1.3 + 0.42 * members + wealth + 0.8 * random.normal())),
    hasFridge: random.uniform() < 0.55 + 0.2 * urban + 0.3 * wealth ? 1 : 0,
    ownsHome: random.uniform() < (urban ? 0.48 : 0.81) ? 1 : 0,
    interviewDay: 1 + random.integer(28),
    weight: Math.round(10 * (urban ? 390 : 270) * Math.exp(0.45 * random.normal())) / 10,
    logTotal: 4.447 + 0.46 * Math.log(members) + 0.1 * urban + wealth,
  };
}

/** Mostly two to five; at most twelve. */
export function drawMembers(random: Random): number {
  for (;;) {
    const members = Math.round(3.6 * Math.exp(0.48 * random.normal()));
    if (members >= 1 && members <= 12) return members;
  }
}
