import { type GroupsSpecification, TOTAL_EXPENDITURE } from "../../../shared/schemas/elasticities.ts";
import { groupsOf } from "../columns/groups.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import { Refusal } from "../refusal.ts";
import { quantileGroups } from "./weighted.ts";

/** Rows used (positions from 0) under one name. */
export interface RowGroup {
  readonly name: string;
  readonly rows: Int32Array;
}

/** More than these are no groups a person compares; a number with so many values is asked for quantiles. */
const MOST_GROUPS = 24;

const PARTS: Readonly<Record<number, string>> = {
  2: "half",
  3: "third",
  4: "quarter",
  5: "fifth",
  6: "sixth",
  8: "eighth",
  10: "tenth",
};
const ORDINALS = ["lowest", "second", "third", "fourth", "fifth", "sixth", "seventh", "eighth", "ninth"];

/**
 * The rows used, parted as a specification says. Errors: `Refusal` for a column that is not there or lacks values,
 * for more groups than anyone compares, and for quantiles that leave a group without a row.
 */
export function rowGroups(groups: GroupsSpecification, data: PreparedData): RowGroup[] {
  return groups.quantiles === undefined ? byValue(groups.of, data) : byQuantile(groups.of, groups.quantiles, data);
}

function byValue(column: string, data: PreparedData): RowGroup[] {
  if (column === TOTAL_EXPENDITURE && !isColumn(column, data)) {
    throw refusal("Total expenditure has as many values as rows: give quantiles beside it, such as quantiles: 5.");
  }
  const { codes, labels } = groupsOf(data, column, ["groups", "of"]);
  if (labels.length > MOST_GROUPS) {
    const instead = data.numeric.has(column) ? "give quantiles beside it" : "name a column with fewer";
    throw refusal(
      `${column} has ${labels.length} different values, and at most ${MOST_GROUPS} are groups: ${instead}.`,
    );
  }
  return partedBy(
    codes,
    labels.map((label) => `${column} = ${label}`),
  );
}

function byQuantile(column: string, quantiles: number, data: PreparedData): RowGroup[] {
  const values = data.numeric.get(column) ?? (column === TOTAL_EXPENDITURE ? data.logTotal : undefined);
  if (values === undefined) {
    if (data.labelled?.has(column) || data.nearlyUnique?.has(column)) {
      throw refusal(`${column} is a text column and has no quantiles: leave quantiles out, or name a number.`);
    }
    groupsOf(data, column, ["groups", "of"]);
    throw refusal(`${column} has no quantiles.`);
  }
  const groups = partedBy(quantileGroups(values, quantiles, data.weights), names(quantiles));
  const empty = groups.find(({ rows }) => rows.length === 0);
  if (empty) {
    const distinct = new Set(values).size;
    throw new Refusal([
      {
        sentence: `No row falls into the ${empty.name} of ${column}, which has ${distinct} different values in ${data.rows} rows used, equal ones staying together: give fewer quantiles than ${quantiles}, or none.`,
        key: ["groups", "quantiles"],
      },
    ]);
  }
  return groups;
}

function isColumn(column: string, data: PreparedData): boolean {
  return data.numeric.has(column) || data.labelled?.has(column) === true;
}

/** "lowest fifth", "second fifth" … "highest fifth"; "group 3 of 12, lowest first" where there is no such word. */
function names(quantiles: number): string[] {
  const part = PARTS[quantiles];
  return Array.from({ length: quantiles }, (_, at) => {
    if (part === undefined) return `group ${at + 1} of ${quantiles}, lowest first`;
    return `${at === quantiles - 1 ? "highest" : ORDINALS[at]} ${part}`;
  });
}

function partedBy(codes: ArrayLike<number>, labels: readonly string[]): RowGroup[] {
  const counts = new Int32Array(labels.length);
  for (let t = 0; t < codes.length; t++) counts[codes[t]]++;
  const groups = labels.map((name, code) => ({ name, rows: new Int32Array(counts[code]) }));
  const filled = new Int32Array(labels.length);
  for (let t = 0; t < codes.length; t++) groups[codes[t]].rows[filled[codes[t]]++] = t;
  return groups;
}

function refusal(sentence: string): Refusal {
  return new Refusal([{ sentence, key: ["groups", "of"] }]);
}
