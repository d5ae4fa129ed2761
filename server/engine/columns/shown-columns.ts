import type { DataSpecification } from "../../../shared/schemas/data.ts";
import type { accountRows } from "./prepare.ts";
import type { PreparedData, TableColumn, UploadTable } from "./prepared-data.ts";
import type { ShownColumn } from "./rows-page.ts";

type Accounted = ReturnType<typeof accountRows>;

interface About {
  readonly specification: DataSpecification;
  readonly table: UploadTable;
  readonly accounted: Accounted;
}

/** Each column once, what is said of it first where it is said twice. */
function once(columns: readonly (ShownColumn | undefined)[]): ShownColumn[] {
  const seen = new Set<string>();
  return columns.filter((shown): shown is ShownColumn => {
    if (shown === undefined || seen.has(shown.column.name)) return false;
    seen.add(shown.column.name);
    return true;
  });
}

/** The file's first column, which as a rule says who a row is, and what tells where and when. */
function aroundIt({ specification, table, accounted }: About): (ShownColumn | undefined)[] {
  const named = (key: "cluster" | "time") => {
    const column = accounted.derived.columns.get(specification[key] ?? "");
    return column && { column, says: key };
  };
  return [table.columns.length > 0 ? { column: table.columns[0] } : undefined, named("cluster"), named("time")];
}

/** What goods are made of: the columns named, and the price where it was formed from two of them. */
export function columnsOfGoods(goods: readonly number[], about: About): ShownColumn[] {
  const { accounted } = about;
  const parts = goods.flatMap((good) => {
    const { name, given, price } = accounted.goods[good];
    const named = Object.entries(given).map(([part, column]): ShownColumn => {
      const of = part === "expenditure" ? "expenditure on" : `${part} of`;
      return { column: numbers(column.name, column.values), says: `${of} ${name}` };
    });
    if (given.price !== undefined) return named;
    return [...named, { column: numbers(`price of ${name}`, price), says: "expenditure ÷ quantity" }];
  });
  // The columns named stand before the one that merely comes first in the file, where that is one of them.
  const [first, ...around] = aroundIt(about);
  const isNamed = parts.some(({ column }) => column.name === first?.column.name);
  return once([isNamed ? undefined : first, ...parts, ...around]);
}

/** Every column a specification names, each with what it is. */
export function columnsOfSpecification(specification: DataSpecification, table: UploadTable, accounted: Accounted) {
  const about = { specification, table, accounted };
  const all = columnsOfGoods([...accounted.goods.keys()], about);
  const roles = (["total", "weight"] as const).map((key) => {
    const column = accounted.roles[key];
    return column && { column: numbers(column.name, column.values), says: key };
  });
  const read = [...(accounted.derived.keep?.reads ?? []), ...accounted.derived.derived.keys()].map((name) => {
    const column = accounted.derived.columns.get(name);
    return column && { column };
  });
  return once([...all, ...roles, ...read]);
}

function numbers(name: string, values: Float64Array): TableColumn {
  return { name, type: "number", values };
}

/** A number of each row used, put where its row stands in the upload. */
export function usedColumn(
  name: string,
  values: Float64Array,
  { table, data }: { readonly table: UploadTable; readonly data: PreparedData },
): TableColumn {
  const whole = new Float64Array(table.rows).fill(Number.NaN);
  values.forEach((value, at) => {
    // Formed to be looked at: more digits than four would only look exact.
    whole[data.rowNumbers[at] - 1] = Number(value.toPrecision(4));
  });
  return numbers(name, whole);
}
