import type { SystemSize } from "../../../shared/systems/demand-system.ts";
import type { LocalColumns, LocalFiller, MomentForm, TermCombination } from "../../../shared/systems/moment-form.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { demographicColumn } from "../columns/seasonal-terms.ts";
import { newColumn } from "../columns/shared-memory.ts";
import { Cancelled, QUIET, type RunControl } from "../run.ts";
import { localResiduals } from "./local-residuals.ts";
import type { MomentSource } from "./moment-source.ts";
import { type LocalMoments, type Moments, type Reduction, reduceRows } from "./moments.ts";
import { localRequest, type MomentsRequest, sourceOf } from "./request.ts";

/** As many moments are kept as a fit and those nested in it pass through. */
const MOST_KEPT = 8;

/** A form whose terms move with θ. */
type LocalForm = MomentForm & { readonly local: LocalColumns };

function hasLocalColumns(form: MomentForm): form is LocalForm {
  return form.local !== undefined;
}

/**
 * The moments of a form estimated first with, where the form itself has columns that move with θ, the way to its
 * own at any θ; `request` is that of the moments given.
 */
export function locatable(
  nearby: Moments,
  data: PreparedData,
  request: MomentsRequest,
  form: MomentForm,
  size: SystemSize,
  reduction?: Reduction,
): Moments {
  if (!hasLocalColumns(form) || nearby.local !== undefined) return nearby;
  const rows = localRows(data, request, form, size);
  const kept: { theta: readonly number[]; moments: Moments }[] = [];
  const local: LocalMoments = {
    nearby,
    at(theta, control) {
      const known = kept.find((place) => sameNumbers(place.theta, theta));
      if (known !== undefined) return known.moments;
      const moments = reduceRows(rows.at(theta, control), rows.key, control, reduction);
      kept.unshift({ theta: [...theta], moments });
      kept.length = Math.min(kept.length, MOST_KEPT);
      return moments;
    },
    kept: (theta) => kept.find((place) => nearTo(place.theta, theta, 1e-8))?.theta,
    residuals(theta, control) {
      return localResiduals(rows.at(theta, control), form.coefficients(theta, size), control);
    },
  };
  return { ...nearby, key: rows.key, local };
}

/** The rows that a request speaks of, where the form has columns that move with θ with those at `theta`. */
export function sourceAt(
  data: PreparedData,
  request: MomentsRequest,
  form: MomentForm,
  size: SystemSize,
  theta: readonly number[],
  control: RunControl = QUIET,
): MomentSource {
  return hasLocalColumns(form) ? localRows(data, request, form, size).at(theta, control) : sourceOf(data, request);
}

/** The columns are filled in place: a source holds until the next θ. */
function localRows(data: PreparedData, nearby: MomentsRequest, form: LocalForm, size: SystemSize) {
  const request = localRequest(form, form.local, size, nearby);
  const columns = form.local.labels.map(() => newColumn(data.rows));
  let last: readonly number[] | undefined;
  return {
    key: request.key,
    at(theta: readonly number[], control: RunControl): MomentSource {
      if (last === undefined || !sameNumbers(last, theta)) {
        last = undefined;
        fillColumns(data, nearby, form.local.filler(theta, size), columns, control);
        last = [...theta];
      }
      const combinations = form.local.combinations?.(theta, size) ?? [];
      const source = sourceOf(data, request, columns);
      // With participation every term stands beside its products with probabilities, which are not combined.
      return request.firstSteps?.participation ? source : withCombinations(source, combinations);
    },
  };
}

/** Columns that only combinations hold are whitened by themselves: no other is whitened by them. */
function withCombinations(source: MomentSource, combinations: readonly TermCombination[]): MomentSource {
  const combined = new Set(combinations.map(({ term }) => term));
  const used = new Set(source.terms.filter((_, term) => !combined.has(term)).flat());
  const groups = source.columns.map((_, at) => (used.has(at + 1) ? (source.groups?.[at] ?? 0) : 2));
  return { ...source, groups, combinations };
}

/** Rows between two looks at `cancelled()`. */
const CHUNK_ROWS = 16_384;

function fillColumns(
  data: PreparedData,
  { demographics }: MomentsRequest,
  filler: LocalFiller,
  columns: readonly Float64Array[],
  control: RunControl,
): void {
  const shifts = demographics.map((name) => demographicColumn(data, name)!);
  const logPrices = new Float64Array(data.goods.length);
  const shares = new Float64Array(data.goods.length);
  const z = new Float64Array(shifts.length);
  for (let t = 0; t < data.rows; t++) {
    if (t % CHUNK_ROWS === 0 && control.cancelled()) throw new Cancelled("cancelled while forming columns");
    for (let i = 0; i < logPrices.length; i++) {
      logPrices[i] = data.logPrices[i][t];
      shares[i] = data.shares[i][t];
    }
    for (let k = 0; k < z.length; k++) z[k] = shifts[k][t];
    filler.at(logPrices, data.logTotal[t], z, shares);
    for (let c = 0; c < columns.length; c++) columns[c][t] = filler.values[c];
  }
}

/** Equal but for the rounding of θ = S φ + s under one set of restrictions and another. */
function sameNumbers(left: readonly number[], right: readonly number[]): boolean {
  return nearTo(left, right, 8 * Number.EPSILON);
}

function nearTo(left: readonly number[], right: readonly number[], within: number): boolean {
  return left.every((value, at) => Math.abs(value - right[at]) <= within * (1 + Math.abs(value)));
}
