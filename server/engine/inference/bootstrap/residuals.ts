import { pickRows } from "../../columns/pick-rows.ts";
import { weightedMean } from "../../columns/weighted.ts";
import { momentMatrix } from "../../estimation/accumulate-sums.ts";
import { type Columns, columnOf } from "../../estimation/columns.ts";
import type { MomentSource } from "../../estimation/moment-source.ts";
import { closure, type Moments, momentsOfFactor, type ReductionPlan } from "../../estimation/moments.ts";
import { multiplyAccumulate } from "../../estimation/multiply-accumulate.ts";
import { factorOfMoments, reflectedFactor, summedFactor } from "../../estimation/row-factors.ts";
import { BLOCK_ROWS, termBlock } from "../../estimation/term-block.ts";
import { responsePlan } from "../../estimation/tile-plan.ts";
import { plainWhitening } from "../../estimation/whitening.ts";
import { QUIET, type RunControl } from "../../run.ts";

/** Residuals of a fit over fixed regressors, ready to be drawn from. Plain data. */
export interface ResidualSource {
  /** The source with centred residuals in place of responses. */
  readonly source: MomentSource;
  /** Responses are not shifted. */
  readonly reduction: ReductionPlan;
  /** Ĉ, n × |Z|. */
  readonly coefficients: readonly (readonly number[])[];
  /** Second moments of the whitened terms, |Z̃| × |Z̃|; absent where so few rows are reduced by reflections. */
  readonly terms?: Columns;
}

const ROWS_FOR_SUMS = 4;

/** e_t = w_t − Ĉ Z_t of every equation, less their weighted means. */
export function residualSource(
  source: MomentSource,
  plan: ReductionPlan,
  coefficients: readonly (readonly number[])[],
): ResidualSource {
  const shift = plan.whitening.shift.slice().fill(0, source.columns.length);
  const reduction: ReductionPlan = { ...plan, whitening: { ...plan.whitening, shift } };
  const residuals = residualColumns(source, coefficients).map((column) => {
    const mean = weightedMean(column, source.weights);
    return column.map((value) => value - mean);
  });
  const drawable: ResidualSource = { source: { ...source, responses: residuals }, reduction, coefficients };
  if (source.rows < ROWS_FOR_SUMS * plan.whitened.length) return drawable;
  const terms = reduction.whitened.slice(0, reduction.whitened.length - source.responses.length);
  const factor = summedFactor({ ...source, responses: [] }, reduction.whitening, terms, QUIET);
  return { ...drawable, terms: gram(factor) };
}

function residualColumns(source: MomentSource, coefficients: readonly (readonly number[])[]): Float64Array[] {
  const { weights: _, ...unweighted } = source;
  const formed = closure(source);
  const placeOf = new Map(formed.map((term, place) => [term.join(), place]));
  const { block, fill } = termBlock(unweighted, plainWhitening(source), formed);
  const residuals = source.responses.map((column) => column.slice());
  for (let from = 0; from < source.rows; from += BLOCK_ROWS) {
    const rows = Math.min(BLOCK_ROWS, source.rows - from);
    fill(from, rows);
    residuals.forEach((column, i) => {
      source.terms.forEach((term, z) => {
        const factor = coefficients[i][z];
        if (factor === 0) return;
        const offset = placeOf.get(term.join())! * BLOCK_ROWS;
        for (let t = 0; t < rows; t++) column[from + t] -= factor * block[offset + t];
      });
    });
  }
  return residuals;
}

function gram(factor: Columns): Columns {
  const product = { rows: factor.columns, columns: factor.columns, values: new Float64Array(factor.columns ** 2) };
  for (let i = 0; i < factor.columns; i++) {
    for (let j = 0; j < factor.columns; j++) {
      let sum = 0;
      for (let r = 0; r <= Math.min(i, j); r++) sum += columnOf(factor, i)[r] * columnOf(factor, j)[r];
      product.values[j * factor.columns + i] = sum;
    }
  }
  return product;
}

/** Moments of w* = ŵ + e*, with e*_t the residuals of row `drawn[t]`: only products with responses are formed anew. */
export function momentsOfResiduals(
  { source, reduction, coefficients, terms }: ResidualSource,
  drawn: Int32Array,
  control: RunControl,
): Moments {
  const redrawn: MomentSource = { ...source, responses: source.responses.map((column) => pickRows(column, drawn)) };
  const factor =
    terms === undefined
      ? reflectedFactor(redrawn, reduction.whitening, reduction.whitened, control)
      : factorOfMoments(momentsWith(redrawn, reduction, terms), source.responses.length);
  const moments = momentsOfFactor(redrawn, "", reduction, factor);
  // w* = ŵ + e*, and ŵ = Ĉ Z is a combination of the terms' own columns.
  moments.responses.values.forEach((_, place) => {
    const i = Math.floor(place / moments.responses.rows);
    const row = place - i * moments.responses.rows;
    let sum = 0;
    for (let z = 0; z < moments.terms.columns; z++) {
      sum += coefficients[i][z] * moments.terms.values[z * moments.terms.rows + row];
    }
    moments.responses.values[place] += sum;
  });
  return moments;
}

function momentsWith(source: MomentSource, { whitening, whitened }: ReductionPlan, terms: Columns): Columns {
  const plan = responsePlan(terms.columns, whitened.length);
  const sums = new Float64Array(plan.tiles * 16);
  const { block, fill } = termBlock(source, whitening, whitened);
  for (let from = 0; from < source.rows; from += BLOCK_ROWS) {
    const rows = Math.min(BLOCK_ROWS, source.rows - from);
    fill(from, rows);
    multiplyAccumulate(block, BLOCK_ROWS, rows, plan, sums);
  }
  const matrix = momentMatrix(plan, sums);
  for (let j = 0; j < terms.columns; j++) columnOf(matrix, j).set(columnOf(terms, j));
  return matrix;
}
