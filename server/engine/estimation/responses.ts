import { type Columns, columnOf, dot } from "./columns.ts";
import type { Estimation } from "./estimation.ts";

/** Weighted means of the responses; the first term is the constant. */
export function meanResponses({ moments }: Pick<Estimation, "moments">): number[] {
  const constant = columnOf(moments.terms, 0);
  const squares = dot(constant, constant);
  return Array.from(
    { length: moments.responses.columns },
    (_, i) => dot(constant, columnOf(moments.responses, i)) / squares,
  );
}

/** Responses less their means. */
export function centredResponses(estimation: Pick<Estimation, "moments">): Columns {
  const { responses, terms } = estimation.moments;
  const constant = columnOf(terms, 0);
  const centred: Columns = { ...responses, values: responses.values.slice() };
  meanResponses(estimation).forEach((mean, i) => {
    const column = columnOf(centred, i);
    for (let r = 0; r < column.length; r++) column[r] -= mean * constant[r];
  });
  return centred;
}
