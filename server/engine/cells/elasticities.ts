import { theoryChecksAt } from "../../../shared/economics/checks.ts";
import type { TheoryChecks } from "../../../shared/schemas/checks.ts";
import {
  type ElasticitiesFinding,
  type ElasticitiesSpecification,
  type ElasticityGroup,
  elasticitiesFinding,
} from "../../../shared/schemas/elasticities.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import { groupHead } from "../../../shared/tables/elasticity-words.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { standardErrorsPhrase } from "../../../shared/tables/standard-errors.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { Refusal } from "../refusal.ts";
import { Cancelled, QUIET, type RunControl } from "../run.ts";
import { caveatsOf } from "./caveats-of.ts";
import { drawsOverRows } from "./elasticity-draws.ts";
import { type RowGroup, rowGroups } from "./elasticity-groups.ts";
import { atGroupMean, atOnePoint, type GroupOrReason } from "./elasticity-points.ts";
import { overRows } from "./elasticity-rows.ts";
import { refusingRanges } from "./refusing.ts";
import type { EstimatedSystem } from "./two-stages.ts";
import { unconditionalAt } from "./unconditional.ts";

/**
 * An elasticities cell: a fitted system's elasticities at one point, at the mean point of each group of rows, or over
 * the rows of each, with standard errors, intervals and classes of goods (methods 3 and 3.2). Where the cell names a
 * broader system, the unconditional ones too (`unconditionalAt`).
 * Errors: `Refusal` (a column that is not there, no group with positive shares, Stone's index asked to move in another
 * system), `Cancelled`.
 */
export function runElasticities(
  specification: ElasticitiesSpecification,
  system: SystemFinding,
  data: PreparedData,
  control: RunControl = QUIET,
  broader?: EstimatedSystem,
): ElasticitiesFinding {
  const { fitted } = system;
  const { groups: groupedBy, over, index, level } = specification;
  // A system in differences predicts no shares: observed ones stand in its formulas whatever is asked.
  const shares = SYSTEMS[fitted.form].kind === "differences" ? ("observed" as const) : specification.shares;
  if (index === "exact" && fitted.index !== "stone") throw new Refusal([{ sentence: MOVES, key: ["index"] }]);
  const { groups, derivativeRows } = evaluated({ ...specification, shares }, system, data, control);
  const found = groups.filter((group): group is ElasticityGroup => !("undefined" in group));
  const without = groups.filter((group) => "undefined" in group);
  if (found.length === 0) throw new Refusal(without.map((group) => refused(group, groupedBy)));
  const { as: group, within } = specification;
  if (within !== undefined && broader === undefined)
    throw new Error("the broader system is handed in where one is named");
  const conditionalOn = system.conditionalOn ?? group;
  return elasticitiesFinding.parse({
    kind: "elasticities",
    dataFingerprint: system.dataFingerprint,
    form: fitted.form,
    ...(fitted.index && { priceIndex: fitted.index }),
    goods: fitted.goods,
    over,
    shares,
    index,
    level,
    standardErrors: standardErrorsPhrase(system),
    intervals: (over === "means" ? system.bootstrap?.draws : drawsOverRows(system, data)) ? "percentile" : "normal",
    ...(groupedBy && { groupedBy }),
    groups: found,
    checks: checksOf(system, found),
    tests: system.tests,
    ...caveatsOf({ ...system, conditionalOn }),
    without,
    ...(derivativeRows && derivativeRows.used < derivativeRows.of && { derivativeRows }),
    ...(conditionalOn !== undefined && { conditionalOn }),
    ...(broader && { unconditional: unconditionalAt(specification, { finding: system, data }, broader, control) }),
  });
}

const MOVES = "index: exact lets the weights of Stone's index in la-aids move; this system has no such index.";

function evaluated(
  specification: ElasticitiesSpecification,
  system: SystemFinding,
  data: PreparedData,
  control: RunControl,
): { groups: GroupOrReason[]; derivativeRows?: { used: number; of: number } } {
  const { groups: groupedBy, over, at } = specification;
  if (!groupedBy && over === "means") {
    return { groups: [refusingRanges(() => atOnePoint(at, specification, system, data, control))] };
  }
  const groups = groupedBy ? rowGroups(groupedBy, data) : [allRows(data)];
  if (over === "rows") return refusingRanges(() => overRows(groups, specification, system, data, control));
  return {
    groups: groups.map((group, done) => {
      if (control.cancelled()) throw new Cancelled("cancelled between groups");
      control.progress({ step: "evaluating groups", fraction: done / groups.length });
      return atGroupMean(group, specification, system, data, control);
    }),
  };
}

/** At the one point of a cell that has one; the system's own where there are groups. */
function checksOf({ fitted, checks }: SystemFinding, groups: readonly ElasticityGroup[]): TheoryChecks {
  const [{ name, rows, point }] = groups;
  if (groups.length > 1 || rows !== undefined || point === undefined) return checks;
  return { ...theoryChecksAt(fitted, point, name), ...(checks.sample && { sample: checks.sample }) };
}

function allRows({ rows }: PreparedData): RowGroup {
  return { name: "all rows", rows: Int32Array.from({ length: rows }, (_, t) => t) };
}

function refused(group: Exclude<GroupOrReason, { shares: unknown }>, groupedBy: ElasticitiesSpecification["groups"]) {
  const { name, undefined: reason } = group;
  const isOneOfSeveral = groupedBy !== undefined;
  const sentence = isOneOfSeveral ? `${groupHead(groupedBy, name)}: ${reason}` : `At ${withArticle(name)}: ${reason}`;
  return { sentence, key: isOneOfSeveral ? ["groups"] : ["at"] };
}
