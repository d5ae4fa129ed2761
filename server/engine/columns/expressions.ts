import type { Problem } from "../../../shared/schemas/problem.ts";
import { nearestWord } from "../../../shared/study/nearest-word.ts";
import { Refusal } from "../refusal.ts";
import { quoteCell } from "./cell-text.ts";
import { choose, FUNCTIONS, OPERATORS, type Operation } from "./expression-operations.ts";
import { columnsRead, type ExpressionTree } from "./expression-tree.ts";
import type { TableColumn } from "./prepared-data.ts";

/** Columns by name, derived ones included. */
export type Columns = ReadonlyMap<string, TableColumn>;

export interface EvaluatedExpression {
  /** NaN where the result is missing. */
  readonly values: Float64Array;
  /** Names of the columns read. */
  readonly reads: readonly string[];
  /** Rows in which nothing read was missing and yet the result is no finite number, such as after a division by zero. */
  readonly undefinedRows: number;
  readonly firstUndefinedRow?: number;
}

type RowFunction = (row: number) => number;

/**
 * Compute an expression in every row.
 *
 * @throws Refusal with every unknown column and every text that is not compared with a text.
 */
export function evaluateExpression(tree: ExpressionTree, columns: Columns, rows: number): EvaluatedExpression {
  const problems: Problem[] = [];
  const at = bind(tree, columns, problems);
  if (problems.length > 0) throw new Refusal(problems);
  const reads = [...columnsRead(tree)].filter((name) => columns.has(name));
  const isMissing = reads.map((name) => missingIn(columns.get(name)));
  const values = new Float64Array(rows);
  let undefinedRows = 0;
  let firstUndefinedRow: number | undefined;
  for (let row = 0; row < rows; row++) {
    // Zero has one sign here, so that equal columns have equal fingerprints.
    const value = at(row) + 0;
    values[row] = value;
    if (Number.isNaN(value) && !isMissing.some((missing) => missing(row))) {
      undefinedRows++;
      firstUndefinedRow ??= row + 1;
    }
  }
  return { values, reads, undefinedRows, ...(firstUndefinedRow === undefined ? {} : { firstUndefinedRow }) };
}

/** Whether a column has no value in a row. */
export function missingIn(
  column: TableColumn | { readonly values: Float64Array } | undefined,
): (row: number) => boolean {
  if (column === undefined) return () => false;
  if ("values" in column) return (row) => Number.isNaN(column.values[row]);
  return (row) => column.codes[row] < 0;
}

const CONSTANTS: Readonly<Record<string, number>> = { pi: Math.PI };

function bind(tree: ExpressionTree, columns: Columns, problems: Problem[]): RowFunction {
  switch (tree.kind) {
    case "number":
      return () => tree.value;
    case "text":
      problems.push({
        sentence: `The text ${quoteCell(tree.value)} can only be compared with a text column by == or !=.`,
      });
      return () => Number.NaN;
    case "column":
      return bindColumn(tree.name, columns, problems);
    case "call":
      return bindTextComparison(tree, columns, problems) ?? bindCall(tree, columns, problems);
  }
}

function bindColumn(name: string, columns: Columns, problems: Problem[]): RowFunction {
  const column = columns.get(name);
  if (column?.type === "number") {
    const { values } = column;
    return (row) => values[row];
  }
  if (column === undefined && Object.hasOwn(CONSTANTS, name)) return () => CONSTANTS[name];
  problems.push(column === undefined ? unknownColumn(name, columns.keys()) : textColumn(column));
  return () => Number.NaN;
}

export function unknownColumn(name: string, names: Iterable<string>): Problem {
  const nearest = nearestWord(name, names);
  const advice = nearest === undefined ? "" : ` The nearest is ${nearest}.`;
  return {
    sentence: `There is no column ${name}.${advice}`,
    column: name,
    ...(nearest === undefined ? {} : { nearest }),
  };
}

function textColumn(column: TableColumn & { type: "text" }): Problem {
  const { name, firstText, levels } = column;
  if (firstText !== undefined) {
    const { row, value } = firstText;
    return { sentence: `${name} is not a column of numbers: row ${row} has ${quoteCell(value)}.`, row, column: name };
  }
  const level = levels[0] === undefined ? "" : `; compare it with a text, such as ${name} == "${levels[0]}"`;
  return { sentence: `${name} is a column of texts${level}.`, column: name };
}

function bindTextComparison(
  tree: ExpressionTree & { kind: "call" },
  columns: Columns,
  problems: Problem[],
): RowFunction | undefined {
  if (tree.name === "missing" && tree.arguments[0].kind === "column") {
    const column = columns.get(tree.arguments[0].name);
    if (column?.type === "text") return (row) => Number(column.codes[row] < 0);
  }
  if (tree.name !== "==" && tree.name !== "!=") return undefined;
  const text = tree.arguments.find((argument) => argument.kind === "text");
  const other = tree.arguments.find((argument) => argument.kind === "column");
  const column = other && columns.get(other.name);
  if (text === undefined || column?.type !== "text") return undefined;
  const level = column.levels.indexOf(text.value);
  if (level < 0) {
    const nearest = nearestWord(text.value, column.levels.slice(0, 10_000));
    const advice = nearest === undefined ? "" : ` The nearest is "${nearest}".`;
    problems.push({
      sentence: `No row of ${column.name} says ${quoteCell(text.value)}.${advice}`,
      column: column.name,
      ...(nearest === undefined ? {} : { nearest }),
    });
  }
  const { codes } = column;
  const whenEqual = tree.name === "==" ? 1 : 0;
  return (row) => (codes[row] < 0 ? Number.NaN : codes[row] === level ? whenEqual : 1 - whenEqual);
}

function bindCall(tree: ExpressionTree & { kind: "call" }, columns: Columns, problems: Problem[]): RowFunction {
  const parts = tree.arguments.map((argument) => bind(argument, columns, problems));
  const [first, second, third] = parts;
  if (tree.name === "?")
    return (row) =>
      choose(
        first(row),
        () => second(row),
        () => third(row),
      );
  const operation: Operation = OPERATORS[tree.name] ?? FUNCTIONS[tree.name];
  const values = new Array<number>(parts.length);
  return (row) => {
    for (let at = 0; at < parts.length; at++) values[at] = parts[at](row);
    return operation.apply(values);
  };
}
