import { type ClusterGroups, type Clusters, groupByCluster } from "./clusters.ts";
import { pickRows } from "./pick-rows.ts";

/**
 * How many median deviations from its median make a log price an outlier.
 *
 * The rule of the median deviation, which half of the rows may be wrong without moving: |v − med v| > 5 · med |v − med v|
 * (Hampel 1974, *Journal of the American Statistical Association* 69, 383–393). Under a normal distribution the median
 * deviation is 0.6745 standard deviations, so that five are 3.4 of them; Iglewicz & Hoaglin (1993, *How to Detect and
 * Handle Outliers*) draw the line at 3.5 standard deviations, which are 5.2. Both from memory. Medians are those of the
 * cluster, where there are any, as prices differ from place to place; the deviation is that of all rows together.
 */
export const OUTLYING_DEVIATIONS = 5;

/** A price ten times its good's median, or a tenth of it, is more likely in other units than paid. */
const IMPLAUSIBLE = Math.log(10);

/** The rows used, by their place, whose value is outlying, and by how much every row is away from its median. */
export function outlyingAt(values: Float64Array, clusters: Clusters | undefined) {
  const away = awayFromMedian(values, clusters && groupByCluster(clusters));
  const typical = median(away.map(Math.abs).sort());
  const at =
    typical > 0 ? placesOf(away, (value) => Math.abs(value) > OUTLYING_DEVIATIONS * typical) : new Int32Array();
  return { at, away, typical };
}

/** The rows used whose value is implausibly far from the median of all. */
export function implausibleAt(values: Float64Array) {
  const away = awayFromMedian(values, undefined);
  return { at: placesOf(away, (value) => Math.abs(value) > IMPLAUSIBLE), away };
}

/** v − med v, in clusters each from its own. */
function awayFromMedian(values: Float64Array, groups: ClusterGroups | undefined): Float64Array {
  if (groups === undefined) {
    const centre = median(values.slice().sort());
    return values.map((value) => value - centre);
  }
  const { order, starts } = groups;
  const away = new Float64Array(values.length);
  for (let cluster = 0; cluster + 1 < starts.length; cluster++) {
    const members = order.subarray(starts[cluster], starts[cluster + 1]);
    const centre = median(pickRows(values, members).sort());
    for (let at = 0; at < members.length; at++) away[members[at]] = values[members[at]] - centre;
  }
  return away;
}

function median(sorted: Float64Array): number {
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

export function placesOf(values: Float64Array, holds: (value: number, at: number) => boolean): Int32Array {
  const places: number[] = [];
  for (let at = 0; at < values.length; at++) if (holds(values[at], at)) places.push(at);
  return Int32Array.from(places);
}
