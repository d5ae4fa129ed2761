import type { DataSpecification } from "../../../shared/schemas/data.ts";
import type { Problem } from "../../../shared/schemas/problem.ts";
import { quoteCell } from "./cell-text.ts";
import { findColumn } from "./derive-columns.ts";
import type { Columns } from "./expressions.ts";
import type { TableColumn } from "./prepared-data.ts";
import { timeValues } from "./time-column.ts";

export type GoodPart = "price" | "quantity" | "expenditure";
const GOOD_PARTS: readonly GoodPart[] = ["price", "quantity", "expenditure"];

export interface NumberColumn {
  readonly name: string;
  readonly values: Float64Array;
}

/** A good by the two columns it names. */
export interface MappedGood extends Partial<Record<GoodPart, NumberColumn>> {
  readonly name: string;
}

/** Which column plays which part. */
export interface Roles {
  readonly goods: readonly MappedGood[];
  readonly total?: NumberColumn;
  readonly weight?: NumberColumn;
  readonly cluster?: TableColumn;
  readonly time?: NumberColumn;
}

/** Look up every column a data specification names, noting everything that is wrong. */
export function resolveRoles(specification: DataSpecification, columns: Columns, problems: Problem[]): Roles {
  const find = (name: string, key: string[]) => findColumn(columns, name, key, problems);
  const numbers = (name: string | undefined, part: string, key: string[]): NumberColumn | undefined => {
    const column = name === undefined ? undefined : find(name, key);
    if (column === undefined) return undefined;
    if (column.type === "number") return column;
    problems.push(textProblem(column, part, key));
    return undefined;
  };
  const goods = Object.entries(specification.goods).map(([name, mapping]): MappedGood => {
    const parts = GOOD_PARTS.map((part) => [part, numbers(mapping[part], part, ["goods", name, part])] as const);
    return { name, ...Object.fromEntries(parts.filter(([, column]) => column !== undefined)) };
  });
  if (goods.length < 2) {
    const named = goods.length === 0 ? "0 goods" : `1 good, ${goods[0].name}`;
    problems.push({ sentence: `A demand system needs at least 2 goods; goods names ${named}.`, key: ["goods"] });
  }
  problems.push(...namedTwice(specification));
  const { cluster, time } = specification;
  const clusterColumn = cluster === undefined ? undefined : find(cluster, ["cluster"]);
  const timeColumn = time === undefined ? undefined : find(time, ["time"]);
  return {
    goods,
    total: numbers(specification.total, "total", ["total"]),
    weight: numbers(specification.weight, "weight", ["weight"]),
    cluster: clusterColumn,
    time: timeColumn && timeValues(timeColumn, problems),
  };
}

function textProblem(column: TableColumn & { type: "text" }, part: string, key: string[]): Problem {
  const row = column.firstText?.row ?? column.codes.findIndex((code) => code >= 0) + 1;
  const value = column.firstText?.value ?? column.levels[column.codes[row - 1]] ?? "";
  return {
    sentence: `${column.name} is to be the ${part}, a column of numbers, and row ${row} has ${quoteCell(value)}.`,
    key,
    row,
    column: column.name,
  };
}

/** The same quantity or expenditure under two goods would be counted twice. */
function namedTwice(specification: DataSpecification): Problem[] {
  const first = new Map<string, string>();
  const problems: Problem[] = [];
  for (const [good, mapping] of Object.entries(specification.goods)) {
    for (const part of GOOD_PARTS) {
      const column = mapping[part];
      if (column === undefined) continue;
      const earlier = first.get(column);
      if (earlier === undefined) first.set(column, part === "price" ? `the price of ${good}` : good);
      else if (part !== "price" || !earlier.startsWith("the price of ")) {
        const sentence = `${column} is named twice, for ${earlier} and as the ${part} of ${good}.`;
        problems.push({ sentence, key: ["goods", good, part], column });
      }
    }
  }
  return problems;
}
