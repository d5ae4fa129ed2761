import { intervalOf, normalIntervals } from "../../../shared/economics/classes.ts";
import { elasticitiesOf, elasticityValues } from "../../../shared/economics/elasticities.ts";
import { unconditionalValues } from "../../../shared/economics/two-stage.ts";
import {
  groupAsGood,
  type UnconditionalElasticities,
  unconditionalElasticities,
} from "../../../shared/economics/two-stage-errors.ts";
import { unconditionalIdentities } from "../../../shared/economics/two-stage-identities.ts";
import type { ElasticitiesSpecification } from "../../../shared/schemas/elasticities.ts";
import type { EstimatesByPrice } from "../../../shared/schemas/elasticity-estimates.ts";
import type { UnconditionalFinding } from "../../../shared/schemas/two-stage.ts";
import { listSome } from "../../../shared/study/words.ts";
import { standardErrorsPhrase } from "../../../shared/tables/standard-errors.ts";
import { Refusal } from "../refusal.ts";
import { polling, type RunControl } from "../run.ts";
import { estimatesOf } from "./elasticity-at.ts";
import { type EstimatedSystem, stageAt } from "./two-stages.ts";

/** Spending on the group further apart than this, in either direction, is of other units, other periods or another group. */
const FARTHEST_APART = 2;

/**
 * Unconditional elasticities of a group's goods at one point of both systems: the mean, the base point or a quantile of
 * each, or one row of the upload that both are of. What is spent on the group there may differ as far as twofold.
 * Errors: `Refusal` (no such good, a row of two uploads, shares that are not positive, what is spent too far apart).
 */
export function unconditionalAt(
  specification: ElasticitiesSpecification,
  own: EstimatedSystem,
  broader: EstimatedSystem,
  control: RunControl,
): UnconditionalFinding {
  const { level, unconditional: formula = "carpentier guyomard" } = specification;
  const r = placeOfGroup(specification, broader);
  requireOneUpload(specification.at, own, broader);
  const [mine, theirs] = [stageAt(specification, own, "system"), stageAt(specification, broader, "within")];
  const group = groupAsGood(theirs.responses, r);
  const spent = { own: mine.total, broader: group.share * theirs.total };
  requireMatch(spent, broader.finding.fitted.goods[r], theirs.pointName);
  const errors = shareRows(own, broader) ? ("bound" as const) : ("independent" as const);
  const poll = polling(control, "evaluating unconditional elasticities");
  const found = unconditionalElasticities(mine, theirs, r, { formula, errors, poll });
  const within = elasticityValues(mine.responses);
  return {
    formula,
    group: broader.finding.fitted.goods[r],
    form: broader.finding.fitted.form,
    pointName: theirs.pointName,
    standardErrors: standardErrorsPhrase(broader.finding),
    errors,
    spent,
    asGood: asGoodWithErrors(theirs, r, level),
    ...withClasses(found, own.finding.fitted.goods, level),
    others: toOthers(found, broader.finding.fitted.goods, r, level),
    identities: unconditionalIdentities(within, group, unconditionalValues(within, group, formula), formula),
  };
}

function placeOfGroup({ as }: ElasticitiesSpecification, { finding }: EstimatedSystem): number {
  const { goods } = finding.fitted;
  const place = as === undefined ? -1 : goods.indexOf(as);
  if (place >= 0) return place;
  const sentence = `The broader system has no good ${as ?? "named in as"}; its goods are ${listSome([...goods])}.`;
  throw new Refusal([{ sentence, key: ["as"] }]);
}

/** A row is one and the same household, or period, only where both systems read the same upload. */
function requireOneUpload(at: ElasticitiesSpecification["at"], own: EstimatedSystem, broader: EstimatedSystem): void {
  if (typeof at !== "object" || !("row" in at)) return;
  const [mine, theirs] = [own.data.finding.upload, broader.data.finding.upload];
  if (mine.sha256 === theirs.sha256) return;
  const sentence = `Row ${at.row} is not the same in both systems: one is of ${mine.name}, the broader one of ${theirs.name}. Give the mean, the base point or a quantile.`;
  throw new Refusal([{ sentence, key: ["at"] }]);
}

function requireMatch({ own, broader }: UnconditionalFinding["spent"], group: string, pointName: string): void {
  const apart = Math.max(own / broader, broader / own);
  if (apart <= FARTHEST_APART) return;
  const print = (value: number) => String(Number(value.toPrecision(6)));
  const sentence = `The two systems do not meet at the ${pointName}: ${group} takes ${print(broader)} in the broader data, and the total of the group's own data is ${print(own)}. Bring both into the same units and periods.`;
  throw new Refusal([{ sentence, key: ["within"] }]);
}

/** Whether both are estimated on rows of one upload, some of them the same. */
function shareRows({ data: one }: EstimatedSystem, { data: other }: EstimatedSystem): boolean {
  if (one.finding.upload.sha256 !== other.finding.upload.sha256) return false;
  const rows = new Set(one.rowNumbers);
  return other.rowNumbers.some((row) => rows.has(row));
}

function asGoodWithErrors(stage: ReturnType<typeof stageAt>, r: number, level: number): UnconditionalFinding["asGood"] {
  const found = elasticitiesOf(stage.responses, stage.gradients, stage.covariance);
  const one = (value: number, error: number) => {
    const [low, high] = intervalOf(value, error, level);
    return { value, error, low, high };
  };
  return {
    share: found.shares[r],
    expenditure: one(found.expenditure[r], found.expenditureErrors[r]),
    uncompensated: one(found.uncompensated[r][r], found.uncompensatedErrors[r][r]),
    compensated: one(found.compensated[r][r], found.compensatedErrors[r][r]),
  };
}

function withClasses(found: UnconditionalElasticities, goods: readonly string[], level: number) {
  const intervals = normalIntervals(found, level);
  return estimatesOf(found, intervals, goods, level);
}

function toOthers(
  { others, othersErrors }: UnconditionalElasticities,
  goods: readonly string[],
  r: number,
  level: number,
): UnconditionalFinding["others"] {
  const estimated = (values: number[][], errors: number[][]): EstimatesByPrice => {
    const ends = values.map((row, i) => row.map((value, s) => intervalOf(value, errors[i][s], level)));
    return {
      values,
      errors,
      low: ends.map((row) => row.map(([low]) => low)),
      high: ends.map((row) => row.map(([, high]) => high)),
    };
  };
  return {
    goods: goods.filter((_, s) => s !== r),
    uncompensated: estimated(others.uncompensated, othersErrors.uncompensated),
    compensated: estimated(others.compensated, othersErrors.compensated),
  };
}
