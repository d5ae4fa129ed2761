import type { DataSpecification } from "../../../shared/schemas/data.ts";
import type { Problem } from "../../../shared/schemas/problem.ts";
import { Refusal } from "../refusal.ts";
import { columnsRead, type ExpressionTree } from "./expression-tree.ts";
import { type Columns, type EvaluatedExpression, evaluateExpression, unknownColumn } from "./expressions.ts";
import { parseExpression } from "./parse-expression.ts";
import type { TableColumn, UploadTable } from "./prepared-data.ts";

export interface DerivedColumns {
  /** The upload's columns, then the derived ones. */
  readonly columns: Columns;
  /** The derived ones by name, in order of dependence. */
  readonly derived: ReadonlyMap<string, EvaluatedExpression>;
  readonly keep?: EvaluatedExpression & { readonly source: string };
}

type Tell = (key: string[], problems: readonly Problem[]) => void;

/** Add the columns of `derive`, each after those it reads, and work out `keep`. */
export function deriveColumns(
  specification: DataSpecification,
  table: UploadTable,
  problems: Problem[],
): DerivedColumns {
  const tell: Tell = (key, found) => problems.push(...found.map((problem) => ({ ...problem, key })));
  const columns = new Map<string, TableColumn>(table.columns.map((column) => [column.name, column]));
  const trees = parseDerived(specification, columns, tell);
  // All of them exist by name from the start: what reads one that fails has no fault of its own.
  for (const name of Object.keys(specification.derive ?? {})) {
    if (!columns.has(name)) columns.set(name, numberColumn(name, new Float64Array(table.rows).fill(Number.NaN)));
  }
  const derived = new Map<string, EvaluatedExpression>();
  for (const [name, tree] of inOrderOfDependence(trees, tell)) {
    const evaluated = attempt(["derive", name], tell, () => evaluateExpression(tree, columns, table.rows));
    if (evaluated === undefined) continue;
    columns.set(name, numberColumn(name, evaluated.values));
    derived.set(name, evaluated);
  }
  const source = specification.keep;
  if (source === undefined) return { columns, derived };
  const kept = attempt(["keep"], tell, () => evaluateExpression(parseExpression(source), columns, table.rows));
  return { columns, derived, ...(kept ? { keep: { ...kept, source } } : {}) };
}

function numberColumn(name: string, values: Float64Array): TableColumn {
  return { name, type: "number", values };
}

function attempt<T>(key: string[], tell: Tell, work: () => T): T | undefined {
  try {
    return work();
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    tell(key, error.problems);
    return undefined;
  }
}

function parseDerived(specification: DataSpecification, columns: Columns, tell: Tell): Map<string, ExpressionTree> {
  const trees = new Map<string, ExpressionTree>();
  for (const [name, source] of Object.entries(specification.derive ?? {})) {
    if (columns.has(name)) {
      tell(
        ["derive", name],
        [{ sentence: `The upload already has a column ${name}; give the derived one another name.` }],
      );
      continue;
    }
    const tree = attempt(["derive", name], tell, () => parseExpression(source));
    if (tree) trees.set(name, tree);
  }
  return trees;
}

/** Each after those it reads; what reads itself, directly or through others, is told and left out. */
function inOrderOfDependence(trees: ReadonlyMap<string, ExpressionTree>, tell: Tell): Map<string, ExpressionTree> {
  const order = new Map<string, ExpressionTree>();
  const circular = new Set<string>();
  const visit = (name: string, path: readonly string[]): void => {
    const tree = trees.get(name);
    if (tree === undefined || order.has(name) || circular.has(name)) return;
    if (path.includes(name)) {
      const circle = path.slice(path.indexOf(name));
      for (const member of circle) circular.add(member);
      const told = [...circle, name].join(" reads ");
      tell(["derive", name], [{ sentence: `${told}: derived columns cannot read each other in a circle.` }]);
      return;
    }
    for (const read of columnsRead(tree)) visit(read, [...path, name]);
    if (!circular.has(name)) order.set(name, tree);
  };
  for (const name of trees.keys()) visit(name, []);
  return order;
}

/** A column by the name a key gives it. */
export function findColumn(
  columns: Columns,
  name: string,
  key: string[],
  problems: Problem[],
): TableColumn | undefined {
  const column = columns.get(name);
  if (column === undefined) problems.push({ ...unknownColumn(name, columns.keys()), key });
  return column;
}
