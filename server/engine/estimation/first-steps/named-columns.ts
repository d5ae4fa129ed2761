import type { Problem } from "../../../../shared/schemas/problem.ts";
import { nearestWord } from "../../../../shared/study/nearest-word.ts";
import type { PreparedData } from "../../columns/prepared-data.ts";
import { Refusal } from "../../refusal.ts";
import type { Regressor } from "./column-factor.ts";

/**
 * The numeric columns a key of the specification names, in the order of the list.
 *
 * Errors: under the key, a column that is no numeric column of the data, lacks values, is
 * named twice, or is also a demographic.
 */
export function namedColumns(
  data: PreparedData,
  names: readonly string[],
  key: readonly string[],
  demographics: readonly string[],
): Regressor[] {
  const problems = names.flatMap((name, place) => {
    const sentence = problemOf(data, name, key[0], names.slice(0, place), demographics);
    return sentence === undefined ? [] : [{ key: [...key], column: name, ...sentence } satisfies Problem];
  });
  if (problems.length > 0) throw new Refusal(problems);
  return names.map((name) => ({ label: name, values: data.numeric.get(name)! }));
}

function problemOf(
  data: PreparedData,
  name: string,
  key: string,
  before: readonly string[],
  demographics: readonly string[],
): Pick<Problem, "sentence" | "nearest" | "row"> | undefined {
  if (before.includes(name)) return { sentence: `${key} names "${name}" twice.` };
  if (demographics.includes(name)) {
    return {
      sentence: `${key} names "${name}", which is also a demographic and so stands in the share equations already.`,
    };
  }
  if (data.numeric.has(name)) return undefined;
  const incomplete = data.incomplete?.get(name);
  if (incomplete !== undefined) {
    const { missing, firstRow } = incomplete;
    const sentence = `${key} names "${name}", which has no value in ${missing} of the ${data.rows} rows used, first in row ${firstRow}: leave them out with keep, or name another column.`;
    return { sentence, row: firstRow };
  }
  const nearest = nearestWord(name, [...data.numeric.keys()]);
  const instead = nearest === undefined ? "" : ` The nearest is "${nearest}".`;
  const sentence = `${key} names "${name}", which is no numeric column of the data.${instead}`;
  return { sentence, ...(nearest !== undefined && { nearest }) };
}
