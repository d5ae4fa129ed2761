import type { Problem } from "../../../shared/schemas/problem.ts";
import { nearestWord } from "../../../shared/study/nearest-word.ts";
import { Refusal } from "../refusal.ts";
import type { IncompleteColumn, PreparedData } from "./prepared-data.ts";

/** Rows by the value of a column: labels in ascending order, whatever the order of the rows. */
export interface Groups {
  readonly column: string;
  /** Of each row used, a place in `labels`. */
  readonly codes: Int32Array | Uint16Array;
  readonly labels: readonly string[];
}

/**
 * Groups the rows used by a column: a text by its labels, a number by its distinct values.
 *
 * @param key where the specification names the column, for the refusal
 * @throws Refusal for a name that is no such column (with the nearest), a column without a value in some row used
 *   (how many, and the first), a text that is nearly different in every row.
 */
export function groupsOf(data: PreparedData, column: string, key: string[]): Groups {
  const text = data.labelled?.get(column);
  if (text?.missing !== undefined) throw refusal(data, column, key, text.missing);
  if (text !== undefined) return { column, codes: text.codes, labels: text.labels };
  const numbers = data.numeric.get(column);
  if (numbers !== undefined) return { column, ...groupNumbers(numbers) };
  throw refusal(data, column, key, data.incomplete?.get(column));
}

function groupNumbers(values: Float64Array): Omit<Groups, "column"> {
  const distinct = [...new Set(values)].sort((one, two) => one - two);
  const codeOf = new Map(distinct.map((value, code) => [value, code]));
  return { codes: Int32Array.from(values, (value) => codeOf.get(value)!), labels: distinct.map(String) };
}

function refusal(data: PreparedData, column: string, key: string[], lacking: IncompleteColumn | undefined): Refusal {
  return new Refusal([{ ...reason(data, column, key.join(": "), lacking), key, column }]);
}

function reason(data: PreparedData, column: string, named: string, lacking: IncompleteColumn | undefined): Problem {
  if (lacking !== undefined) {
    const { missing, firstRow } = lacking;
    const sentence = `${named} names "${column}", which has no value in ${missing} of the ${data.rows} rows used, first in row ${firstRow}: leave them out with keep, or name another column.`;
    return { sentence, row: firstRow };
  }
  const labels = data.nearlyUnique?.get(column);
  if (labels !== undefined) {
    return {
      sentence: `${named} names "${column}", which has ${labels} different values in ${data.rows} rows used: it groups nothing. Name it as the cluster of the data to keep it all the same.`,
    };
  }
  const nearest = nearestWord(column, [...(data.labelled?.keys() ?? []), ...data.numeric.keys()]);
  const instead = nearest === undefined ? "" : ` The nearest is "${nearest}".`;
  return {
    sentence: `${named} names "${column}", which is no column of the data that rows could be grouped by (prices, quantities, expenditures, total and weight are none).${instead}`,
    ...(nearest !== undefined && { nearest }),
  };
}
