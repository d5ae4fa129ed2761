import type { DataFinding } from "../schemas/data.ts";
import type { SlutskyFinding } from "../schemas/slutsky.ts";
import type { SystemFinding } from "../schemas/system.ts";
import { caveatSentences } from "./caveat-words.ts";
import { conditionally } from "./conditional.ts";
import { curvatureSentences } from "./curvature-words.ts";
import { equationsSentences } from "./equations-sentence.ts";
import { endogeneityHeadline } from "./first-steps-words.ts";
import { DECIMALS, printCount, printQuantity, printSize } from "./numbers.ts";
import { capital, countedRows, everyRow, intervalInWords, listed, undefinedSentence } from "./phrases.ts";
import { withArticle } from "./slutsky-matrix.ts";
import { unequalWeightsSentence } from "./standard-errors.ts";
import { decides, isRejected, testOf } from "./verdicts.ts";

const LEFT_OUT: Readonly<Record<DataFinding["accounting"]["leftOut"][number]["reason"], readonly [string, string]>> = {
  keep: ["falls to keep", "fall to keep"],
  "missing value": ["lacks a value", "lack a value"],
  "weight not positive": ["has no positive weight", "have no positive weight"],
  "price not positive": ["shows a price that is not positive", "show a price that is not positive"],
  "negative purchase": ["has a negative purchase", "have a negative purchase"],
  "total not positive": ["bought nothing", "bought nothing"],
  "shares do not sum to one": ["does not add up to its total", "do not add up to their total"],
};

/** "4,812 of 4,938 rows are used. Of the 126 left out, 63 fall to keep and 41 lack a value." */
export function dataSentence({ accounting }: Pick<DataFinding, "accounting">): string {
  const { uploaded, used } = accounting;
  const leftOut = accounting.leftOut.filter(({ count }) => count > 0);
  if (leftOut.length === 0)
    return uploaded === 1 ? "The one row is used." : `All ${printCount(uploaded)} rows are used.`;
  const parts = leftOut.map(({ reason, count }) => `${printCount(count)} ${LEFT_OUT[reason][count === 1 ? 0 : 1]}`);
  const verb = used === 1 ? "is" : "are";
  return `${printCount(used)} of ${countedRows(uploaded)} ${verb} used. Of the ${printCount(uploaded - used)} left out, ${listed(parts)}.`;
}

type ToldSystem = Pick<
  SystemFinding,
  | "checks"
  | "tests"
  | "expenditureElasticities"
  | "rows"
  | "unitsMatterBy"
  | "equations"
  | "expenditure"
  | "endogeneity"
  | "curvature"
  | "effectiveRows"
  | "conditionalOn"
>;

/** Which goods are luxuries and necessities beyond doubt, then what theory is violated. */
export function systemSentence(system: ToldSystem): string {
  return [
    classesOfGoods(system),
    ...violations(system),
    ...undefinedSentence(system.checks.sample?.undefined, system.checks.sample?.rows ?? 0),
    ...unequalWeightsSentence(system),
    ...ofUnits(system),
    ...curvatureSentences(system),
    ...equationsSentences(system),
    ...endogeneityHeadline(system),
  ].join(" ");
}

function ofUnits({ unitsMatterBy }: ToldSystem): string[] {
  if (unitsMatterBy === undefined) return [];
  return [`Prices are not normalised, so with ${unitsMatterBy} the estimates depend on their units.`];
}

/** Normal quantile of a 95 % interval. */
const WIDTH = 1.959963984540054;

function classesOfGoods({ expenditureElasticities, checks, conditionalOn }: ToldSystem): string {
  const low = (e: ToldSystem["expenditureElasticities"][number]) => e.estimate - WIDTH * e.standardError;
  const high = (e: ToldSystem["expenditureElasticities"][number]) => e.estimate + WIDTH * e.standardError;
  const ordered = expenditureElasticities.toSorted((a, b) => b.estimate - a.estimate);
  const luxury = ordered.find((e) => low(e) > 1);
  const inferior = ordered.findLast((e) => high(e) < 0);
  const necessity = ordered.findLast((e) => low(e) > 0 && high(e) < 1);
  const parts = [
    ...(luxury ? [[luxury.good, "a luxury"]] : []),
    ...(inferior ? [[inferior.good, "an inferior good"]] : []),
    ...(necessity && !inferior ? [[necessity.good, "a necessity"]] : []),
  ];
  const at = `${withArticle(checks.pointName)}${conditionally({ conditionalOn })}`;
  if (parts.length === 0) return `No good is a luxury or a necessity beyond doubt at ${at}.`;
  const told = parts.map(([good, kind], i) => `${good} ${i === 0 ? "is " : ""}${kind}`);
  return `${capital(listed(told))} at ${at}.`;
}

function violations({ checks, tests, rows }: ToldSystem): string[] {
  const isGiven = checks.homogeneity.status !== "free";
  const laws = [
    { name: "homogeneity", status: checks.homogeneity.status, test: testOf("homogeneity", tests) },
    {
      name: isGiven ? "symmetry" : "symmetry given homogeneity",
      status: checks.symmetry.status,
      test: testOf("symmetry given homogeneity", tests),
    },
  ];
  const rejected = laws.filter(({ test }) => isRejected(test));
  const imposed = rejected.filter(({ status }) => status === "imposed").map(({ name }) => name);
  const free = rejected.filter(({ status }) => status === "free").map(({ name }) => name);
  const [homogeneity] = laws;
  const sentences: string[] = [];
  if (imposed.length > 0) {
    sentences.push(`The data reject ${listed(imposed)}, which ${imposed.length === 1 ? "is" : "are"} imposed.`);
  }
  if (free.length > 0) sentences.push(`${capital(listed(free))} ${free.length === 1 ? "is" : "are"} rejected.`);
  if (homogeneity.status === "free") {
    const isAccepted = homogeneity.test && decides(homogeneity.test) && !isRejected(homogeneity.test);
    const accepted = "Homogeneity is not rejected. It is not imposed either, so negativity cannot be stated.";
    sentences.push(isAccepted ? accepted : "Without homogeneity, negativity cannot be stated.");
  } else sentences.push(...negativitySentence(checks, rows));
  if (!checks.monotonicity.holds) {
    sentences.push(`A predicted share leaves the range from 0 to 1 at ${withArticle(checks.pointName)}.`);
  }
  return sentences;
}

function negativitySentence({ negativity, sample, pointName }: ToldSystem["checks"], rows: number): string[] {
  if (negativity.holds === false) {
    return [`Negativity breaks at ${withArticle(pointName)}: the largest eigenvalue is ${estimate(negativity)}.`];
  }
  const breaks = sample?.negativity?.breaks ?? 0;
  return breaks > 0 ? [`Negativity breaks in ${printCount(breaks)} of ${countedRows(rows)}.`] : [];
}

function estimate({ largest = 0, standardError, interval }: ToldSystem["checks"]["negativity"]): string {
  const error = standardError === undefined ? "" : ` (${printQuantity(standardError, "entry")})`;
  const ends = interval === undefined ? "" : `, ${intervalInWords(interval, DECIMALS.entry)}`;
  return `${printQuantity(largest, "entry")}${error}${ends}`;
}

type ToldMatrix = Pick<SlutskyFinding, "at" | "pointName" | "sample" | "caveats" | "conditionalOn">;

/** What the matrix is at its point, then where it breaks. */
export function slutskySentence({ at: { checks }, pointName, sample, caveats, conditionalOn }: ToldMatrix): string {
  const at = withArticle(pointName);
  const matrix = `The matrix${conditionally({ conditionalOn })}${conditionalOn === undefined ? "" : ","}`;
  const { symmetry, negativity } = checks;
  const symmetric = symmetry.holds ? "symmetric" : `not symmetric, by up to ${printSize(symmetry.size)},`;
  const first = !negativity.stated
    ? `${matrix} is ${symmetric.replace(/,$/, "")} at ${at}. Without homogeneity, negativity cannot be stated.`
    : negativity.holds
      ? `${matrix} is ${symmetric} and negative semidefinite at ${at}.`
      : `${matrix} is ${symmetric} and not negative semidefinite at ${at}: the largest eigenvalue is ${estimate(negativity)}.`;
  const monotone = checks.monotonicity.holds ? [] : [`A predicted share leaves the range from 0 to 1 at ${at}.`];
  const undefinedRows = undefinedSentence(checks.sample?.undefined, checks.sample?.rows ?? 0);
  return [
    first,
    ...monotone,
    ...whereItBreaks(sample),
    ...undefinedRows,
    ...caveatSentences({ caveats, conditionalOn }),
  ].join(" ");
}

function whereItBreaks(sample: ToldMatrix["sample"]): string[] {
  if (!sample || sample.breaks === 0) return [];
  const { breaks, rows, breaksInRichestTenth, goods } = sample;
  if (breaks === rows) return [`Negativity breaks in ${everyRow(rows)}.`];
  // Said where the richest tenth has more than twice its part of the breaks.
  const isOfTheRich = breaks > 1 && breaksInRichestTenth / breaks > 0.2;
  const rich = isOfTheRich ? `, ${printCount(breaksInRichestTenth)} of them in the richest tenth` : "";
  const through = goods.length > 0 ? `, most often through ${listed(goods.slice(0, 2))}` : "";
  return [`Negativity breaks in ${printCount(breaks)} of ${countedRows(rows)}${rich}${through}.`];
}
