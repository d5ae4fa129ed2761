import type { DrawnOf } from "../../../shared/schemas/figure.ts";
import { whyNotDefined } from "../../../shared/systems/index.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { Refusal } from "../refusal.ts";
import { meanOver, weightOver } from "./elasticity-points.ts";
import type { AskedOfSystem, DrawnWith } from "./figure-asked.ts";
import { meanErrorsPhrase, meanWithError } from "./figure-means.ts";
import { requireShares } from "./figure-system.ts";
import { forEachRow } from "./rows.ts";
import { quantileGroups } from "./weighted.ts";

const BINS = 10;

/** Observed mean shares of rows whose predicted shares are near each other: a tenth of the weight in each bin. */
export function fitOfShares({ specification, goods, system, data, control }: AskedOfSystem): DrawnWith {
  const { fitted } = system;
  requireShares({ system }, "predicted shares to hold against observed ones");
  const predicted = fitted.goods.map(() => new Float64Array(data.rows));
  const isDefined = new Uint8Array(data.rows);
  forEachRow(fitted, data, control, (row, t) => {
    isDefined[t] = row.isDefined() ? 1 : 0;
    for (let i = 0; i < predicted.length; i++) predicted[i][t] = row.shares[i];
  });
  const defined = Int32Array.from(isDefined.keys()).filter((t) => isDefined[t] === 1);
  if (defined.length === 0) {
    throw new Refusal(`The system is defined in none of ${data.rows} rows: ${whyNotDefined(fitted.form)}.`);
  }
  const without = Int32Array.from(isDefined.keys()).filter((t) => isDefined[t] === 0);
  return {
    intervals: "normal",
    standardErrors: meanErrorsPhrase(data),
    drawn: {
      show: "fit of shares",
      rows: data.rows,
      goods: goods.map((i) => ({
        good: fitted.goods[i],
        bins: binned(predicted[i], data.shares[i], defined, data, specification.level),
      })),
      ...(without.length > 0 && {
        notDefined: {
          rows: without.length,
          weightedShare: weightOver(without, data.weights) / weightOver(undefined, data.weights, data.rows),
          reason: whyNotDefined(fitted.form),
        },
      }),
    },
  };
}

/** Equal predictions stay together, so that a system without regressors has one bin. */
function binned(
  predicted: Float64Array,
  observed: Float64Array,
  rows: Int32Array,
  data: PreparedData,
  level: number,
): DrawnOf<"fit of shares">["goods"][number]["bins"] {
  const { weights } = data;
  const group = quantileGroups(
    Float64Array.from(rows, (t) => predicted[t]),
    BINS,
    weights && Float64Array.from(rows, (t) => weights[t]),
  );
  const all = weightOver(rows, weights);
  return Array.from({ length: BINS }, (_, bin) => rows.filter((_, at) => group[at] === bin))
    .filter((own) => own.length > 0)
    .map((own) => ({
      rows: own.length,
      weightShare: weightOver(own, weights) / all,
      predicted: meanOver(predicted, own, weights),
      observed: meanWithError(observed, own, data, level),
    }));
}
