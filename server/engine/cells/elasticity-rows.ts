import { AggregateGradients, AggregateResponses } from "../../../shared/economics/aggregate.ts";
import { type ResponseOptions, responsesFrom, slopesAt } from "../../../shared/economics/responses.ts";
import type { ElasticitiesSpecification } from "../../../shared/schemas/elasticities.ts";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { systemOf, whyNotDefined } from "../../../shared/systems/index.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { type Poll, polling, type RunControl } from "../run.ts";
import { evaluatedGroup, notPositive } from "./elasticity-at.ts";
import { drawsOverRows, elasticitiesOverDraws, heldBy } from "./elasticity-draws.ts";
import type { RowGroup } from "./elasticity-groups.ts";
import { type GroupOrReason, meanOver, weightOver } from "./elasticity-points.ts";
import { demographicColumns } from "./points.ts";

type Options = Pick<ElasticitiesSpecification, "shares" | "index" | "level">;

const ROWS_BETWEEN_REPORTS = 1024;
/** Products that the derivatives of all groups may come to: some seconds. Further rows enter the estimates alone. */
const MOST_PRODUCTS = 1e8;
/** No group's derivatives rest on fewer rows than these, if it has them. */
const FEWEST_SAMPLED = 500;

/** How many rows the derivatives of the standard errors are taken at. */
export interface DerivativeRows {
  used: number;
  readonly of: number;
}

/**
 * Elasticities over the rows of each group, each row weighted by what it spends on the good (`AggregateResponses`).
 * The estimates go over every row in which shares are predicted; the others are counted. The derivatives behind the standard errors cost n²k products a row and go over
 * every row too, up to a budget; beyond it over every m-th row of the group, which moves a standard error by about
 * 1/√rows of itself, and the finding says so.
 */
export function overRows(
  groups: readonly RowGroup[],
  options: Options,
  system: SystemFinding,
  data: PreparedData,
  control: RunControl,
): { groups: GroupOrReason[]; derivativeRows: DerivativeRows } {
  const { fitted } = system;
  const products = data.goods.length ** 2 * fitted.theta.length;
  const stride = Math.max(1, Math.ceil((data.rows * products) / MOST_PRODUCTS));
  const derivativeRows: DerivativeRows = { used: 0, of: data.rows };
  let done = 0;
  // The derivatives of a row of many goods take as long as a thousand rows of few.
  const poll = polling(control, "going over the rows");
  const passed = () => {
    poll();
    if (done++ % ROWS_BETWEEN_REPORTS > 0) return;
    control.progress({ step: "going over the rows", fraction: done / data.rows });
  };
  const evaluated = groups.map((group) => {
    const every = Math.max(1, Math.min(stride, Math.floor(group.rows.length / FEWEST_SAMPLED)));
    return overGroup(group, { ...options, every }, system, data, { passed, poll }, derivativeRows);
  });
  return { groups: evaluated, derivativeRows };
}

function overGroup(
  { name, rows }: RowGroup,
  { shares, index, level, every }: Options & { every: number },
  finding: SystemFinding,
  data: PreparedData,
  { passed, poll }: { readonly passed: () => void; readonly poll: Poll },
  derivativeRows: DerivativeRows,
): GroupOrReason {
  const { fitted } = finding;
  const { system, size } = systemOf(fitted);
  const evaluator = system.evaluator(fitted.theta, size);
  const demographics = demographicColumns(data, fitted.demographics);
  const goods = data.goods.map((_, i) => i);
  const sums = new AggregateResponses(goods.length);
  const gradients = new AggregateGradients(goods.length, fitted.theta.length);
  const below = goods.map(() => 0);
  const without = { rows: 0, weight: 0 };
  const add = (t: number, withDerivatives: boolean) => {
    const logPrices = data.logPrices.map((column) => column[t]);
    const observed = shares === "observed" ? data.shares.map((column) => column[t]) : undefined;
    const rowOptions: ResponseOptions = { index, ...(observed && { observed }) };
    const weight = (data.weights ? data.weights[t] : 1) * Math.exp(data.logTotal[t]);
    const own = demographics.map((column) => column[t]);
    evaluator.at(logPrices, data.logTotal[t], own);
    if (Number.isNaN(evaluator.shares[0])) {
      without.rows++;
      without.weight += data.weights ? data.weights[t] : 1;
      return;
    }
    const responses = responsesFrom(fitted.form, heldBy(evaluator), logPrices, rowOptions);
    sums.add(responses, weight);
    for (const i of goods) if (!(responses.shares[i] > 0)) below[i]++;
    if (!withDerivatives) return;
    derivativeRows.used++;
    const point = { prices: logPrices.map(Math.exp), total: Math.exp(data.logTotal[t]), demographics: own };
    const { slopes, derivatives } = slopesAt(fitted, point, rowOptions);
    gradients.add(slopes, derivatives, weight);
  };
  rows.forEach((t, at) => {
    passed();
    add(t, at % every === every >> 1);
  });
  const about = {
    name,
    rows: rows.length,
    weightShare: weightOver(rows, data.weights) / weightOver(undefined, data.weights, data.rows),
    total: meanOver(data.logTotal.map(Math.exp), rows, data.weights) * data.totalScale,
  };
  const notDefined = whyNotDefined(fitted.form);
  if (without.rows === rows.length) {
    return { ...about, undefined: `The system is not defined in any of the rows: ${notDefined}.` };
  }
  const responses = sums.result();
  const reason = notPositive(responses.shares, fitted.goods, shares);
  if (reason !== undefined) return { ...about, undefined: reason };
  const draws = drawsOverRows(finding, data);
  const drawn =
    draws && elasticitiesOverDraws(fitted, draws, rows, { observed: shares === "observed", index }, data, poll);
  return {
    ...about,
    ...(without.rows > 0 && {
      notDefined: {
        rows: without.rows,
        weightedShare: without.weight / weightOver(rows, data.weights),
        reason: notDefined,
      },
    }),
    notPositive: goods.flatMap((i) => (below[i] > 0 ? [{ good: fitted.goods[i], rows: below[i] }] : [])),
    ...evaluatedGroup(fitted, { responses, gradients: gradients.result() }, level, poll, drawn),
  };
}
