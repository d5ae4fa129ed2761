import { z } from "zod";
import { count, matrix } from "../../../shared/schemas/primitives.ts";
import type { SystemFinding, SystemSpecification } from "../../../shared/schemas/system.ts";
import { SYSTEMS, systemOf } from "../../../shared/systems/index.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { withTimeTerms } from "../columns/seasonal-terms.ts";
import type { Columns } from "../estimation/columns.ts";
import { momentsRequest, refitMoments } from "../estimation/index.ts";
import type { RunControl } from "../run.ts";
import { momentsOf } from "./system.ts";

/**
 * The moments a system was estimated from, as they are stored: rows of [Z W] with [Z W]'[Z W] = Σ_t h_t [Z_t W_t]'[Z_t W_t],
 * from which the coefficients follow without the households.
 */
export const storedMoments = z.strictObject({
  rows: count,
  weighted: z.boolean(),
  responses: z.array(z.string()),
  /** r × |Z|. */
  terms: matrix,
  /** r × n. */
  values: matrix,
});
export type StoredMoments = z.infer<typeof storedMoments>;

/**
 * Rows behind every column of the moments, at least. Moments of C columns hold C(C + 1)/2 numbers, as many as (C + 1)/2
 * rows: with five rows a column a tenth of what would be needed to work the rows out. What the data's owner asks comes
 * first.
 */
const ROWS_A_COLUMN = 5;

/** The moments of a specification over data, or why they are not to be stored or would not do. Errors: `Cancelled`. */
export function momentsToStore(
  given: SystemSpecification,
  data: PreparedData,
  control: RunControl,
): StoredMoments | { readonly absent: string } {
  const absent = whyNotFromMoments(given);
  if (absent !== undefined) return { absent };
  const specification = withTimeTerms(given, data);
  const moments = momentsOf(data, momentsRequest(specification, data), control);
  const columns = moments.terms.columns + moments.responses.columns;
  if (moments.rows < ROWS_A_COLUMN * columns) {
    return {
      absent: `${moments.rows} rows stand behind moments of ${columns} columns, and ${ROWS_A_COLUMN * columns} are asked for, so that no household can be worked out.`,
    };
  }
  return {
    rows: moments.rows,
    weighted: moments.weighted,
    responses: [...moments.responseLabels],
    terms: rowsOf(moments.terms),
    values: rowsOf(moments.responses),
  };
}

/** What is estimated from more than moments that stay the same whatever θ is, in words. */
export function whyNotFromMoments(specification: SystemSpecification): string | undefined {
  const { form, differences, errors, instruments, zeros, curvature } = specification;
  const exact = form === "easi" && specification["real expenditure"] !== "approximate";
  if (exact || SYSTEMS[form].moments.local !== undefined) {
    return "Terms of this form move with its coefficients: its moments are others at every step, and it needs the rows.";
  }
  if (instruments !== undefined || zeros !== undefined) return "First steps are estimated from the rows.";
  if (curvature !== undefined) return "Negativity is imposed at a point that is read from the rows.";
  if (differences === true) return "In differences the terms are read from the rows in the order of time.";
  if (errors === "expenditures") return "With errors on expenditures the terms are read from the rows.";
  return undefined;
}

/**
 * θ and, where a specification asks for conventional standard errors, its covariance, estimated anew from stored moments.
 * Errors: `Refusal` as the estimation's own; moments of another size than the system's.
 */
export function refitFromMoments(
  specification: SystemSpecification,
  { fitted, dropped }: Pick<SystemFinding, "fitted" | "dropped">,
  stored: StoredMoments,
  control: RunControl,
): { readonly theta: readonly number[]; readonly covariance?: readonly (readonly number[])[] } {
  const { system, size } = systemOf(fitted);
  const moments = {
    key: "stored",
    rows: stored.rows,
    weighted: stored.weighted,
    responseLabels: stored.responses,
    terms: columnsOf(stored.terms, "terms"),
    responses: columnsOf(stored.values, "values"),
    dependent: [],
  };
  const expected = system.moments.terms(size).length;
  if (moments.terms.columns !== expected || moments.responses.columns !== fitted.goods.length) {
    throw new RangeError(
      `The moments have ${moments.terms.columns} terms and ${moments.responses.columns} responses, and the system has ${expected} and ${fitted.goods.length}.`,
    );
  }
  const { demographics, goods } = fitted;
  return refitMoments(
    { ...specification, demographics: [...demographics] },
    { system, size, goods, dropped, moments },
    control,
  );
}

function rowsOf({ rows, columns, values }: Columns): number[][] {
  return Array.from({ length: rows }, (_, i) => Array.from({ length: columns }, (_, j) => values[j * rows + i]));
}

function columnsOf(matrix: readonly (readonly number[])[], name: string): Columns {
  const [rows, columns] = [matrix.length, matrix[0]?.length ?? 0];
  const uneven = matrix.findIndex((row) => row.length !== columns);
  if (uneven >= 0) {
    throw new RangeError(
      `Row ${uneven + 1} of ${name} has ${matrix[uneven].length} numbers, the first has ${columns}.`,
    );
  }
  const values = new Float64Array(rows * columns);
  for (let i = 0; i < rows; i++) for (let j = 0; j < columns; j++) values[j * rows + i] = matrix[i][j];
  return { rows, columns, values };
}
