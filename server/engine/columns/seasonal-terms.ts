import type { Problem } from "../../../shared/schemas/problem.ts";
import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import { Refusal } from "../refusal.ts";
import type { PreparedData } from "./prepared-data.ts";
import { weightedMean } from "./weighted.ts";

const TREND = "trend";

/** Columns made of the time alone, by the names they are listed under among the demographics. */
type TimeTerm =
  | { readonly kind: "trend" }
  | { readonly kind: "dummy"; readonly season: number; readonly period: number }
  | { readonly kind: "sine" | "cosine"; readonly harmonic: number; readonly period: number };

/** "trend", "season 2 of 4", "season sine 1 of 52". */
function nameOf(term: TimeTerm): string {
  if (term.kind === "trend") return TREND;
  const { period } = term;
  return term.kind === "dummy"
    ? `season ${term.season} of ${period}`
    : `season ${term.kind} ${term.harmonic} of ${period}`;
}

function termNamed(name: string): TimeTerm | undefined {
  if (name === TREND) return { kind: "trend" };
  const match = /^season (?:(sine|cosine) )?(\d+) of (\d+)$/.exec(name);
  if (match === null) return undefined;
  const [number, period] = [Number(match[2]), Number(match[3])];
  if (match[1] === undefined) return { kind: "dummy", season: number, period };
  return { kind: match[1] as "sine" | "cosine", harmonic: number, period };
}

/** The columns that `season` and `trend` of a specification stand for. */
function namesOf({ season, trend }: Pick<SystemSpecification, "season" | "trend">): string[] {
  const terms: TimeTerm[] = trend ? [{ kind: "trend" }] : [];
  if (season !== undefined) {
    const { period, harmonics } = season;
    if (harmonics === undefined) {
      for (let number = 1; number < period; number++) terms.push({ kind: "dummy", season: number, period });
    }
    for (let harmonic = 1; harmonic <= (harmonics ?? 0); harmonic++) {
      // Two terms a round: the sine of the shortest wave is nought at every whole period.
      if (2 * harmonic < period) terms.push({ kind: "sine", harmonic, period });
      terms.push({ kind: "cosine", harmonic, period });
    }
  }
  return terms.map(nameOf);
}

/**
 * The specification with its trend and seasonal terms among the demographics, under the names by which
 * `demographicColumn` finds them: wherever the fitted system is evaluated, they are demographics like others.
 *
 * Errors: `Refusal` under trend or season for data without a time column, a season of a time that is not in whole
 * periods or has fewer of them than one round, a system that takes no demographics, and a column of that name.
 */
export function withTimeTerms(specification: SystemSpecification, data: PreparedData): SystemSpecification {
  const { season, trend, ...rest } = specification;
  const problems: Problem[] = [];
  if (trend) problems.push(...problemsOf("trend", specification, data));
  if (season !== undefined) {
    problems.push(...problemsOf("season", specification, data));
    if (data.time !== undefined) problems.push(...problemsOfSeason(season.period, data.time, data));
  }
  if (problems.length > 0) throw new Refusal(problems);
  return { ...rest, demographics: [...rest.demographics, ...namesOf(specification)] };
}

function problemsOf(key: "trend" | "season", specification: SystemSpecification, data: PreparedData): Problem[] {
  const system = SYSTEMS[specification.form];
  const problems: string[] = [];
  if (data.time === undefined)
    problems.push(`${key} counts the periods of the time column, and the data cell names none: give it time.`);
  if (!system.takesDemographics)
    problems.push(`The ${system.longName} takes no demographics, and ${key} would be among them.`);
  const taken = namesOf({ [key]: specification[key] }).find((name) => data.numeric.has(name));
  if (taken !== undefined)
    problems.push(
      `${key} would make a column "${taken}", and the data have one of that name: name it in demographics instead, or rename it.`,
    );
  return problems.map((sentence) => ({ sentence, key: [key] }));
}

function problemsOfSeason(period: number, time: Float64Array, data: PreparedData): Problem[] {
  const key = ["season", "period"];
  const broken = time.findIndex((value) => !Number.isInteger(value));
  if (broken >= 0) {
    const row = data.rowNumbers[broken];
    const sentence = `season needs a time in whole periods, and in row ${row} the time is ${time[broken]}.`;
    return [{ sentence, key, row }];
  }
  const periods = new Set(time).size;
  if (periods >= period) return [];
  const sentence = `One round of the seasons is ${period} periods, and the data have ${periods}: shorten period, or leave season out.`;
  return [{ sentence, key }];
}

const known = new WeakMap<PreparedData, Map<string, Float64Array>>();

/**
 * A demographic by its name: a numeric column of the data, or a term of time, centred at its weighted mean over
 * the rows used, so that where demographics are at their means, as at the base point, intercepts are those
 * of no season and of the mean time:
 *
 *     trend            t − t̄, in periods of the time column
 *     season s of P    1 where ((t − 1) mod P) + 1 = s, less its mean; the last season has none of its own
 *     season sine k of P, cosine k of P    sin 2πkt/P, cos 2πkt/P, less their means
 *
 * Undefined where there is no such column. Quarters, months, weeks and days are those of the calendar (`timeValues`).
 */
export function demographicColumn(data: PreparedData, name: string): Float64Array | undefined {
  const column = data.numeric.get(name);
  if (column !== undefined) return column;
  const { time } = data;
  const term = termNamed(name);
  if (term === undefined || time === undefined) return undefined;
  if (!known.has(data)) known.set(data, new Map());
  const columns = known.get(data)!;
  const values = columns.get(name) ?? centred(time.map(formulaOf(term)), data.weights);
  columns.set(name, values);
  return values;
}

function formulaOf(term: TimeTerm): (time: number) => number {
  switch (term.kind) {
    case "trend":
      return (time) => time;
    case "dummy":
      return (time) => (seasonAt(time, term.period) === term.season ? 1 : 0);
    case "sine":
    case "cosine": {
      const wave = term.kind === "sine" ? Math.sin : Math.cos;
      // The remainder first: the angle of a year in the hundreds loses no digits.
      return (time) =>
        wave((2 * Math.PI * ((term.harmonic * remainder(time, term.period)) % term.period)) / term.period);
    }
  }
}

const remainder = (time: number, period: number) => ((time % period) + period) % period;
const seasonAt = (time: number, period: number) => remainder(time - 1, period) + 1;

function centred(values: Float64Array, weights: Float64Array | undefined): Float64Array {
  const mean = weightedMean(values, weights);
  return values.map((value) => value - mean);
}
