import type { CellSource } from "../../../shared/study/cell-source.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { listWords } from "../../../shared/study/words.ts";

const ROLES = [
  ["total", "total expenditure"],
  ["weight", "weight"],
  ["cluster", "cluster"],
  ["time", "time"],
] as const;

type Keys = Readonly<Record<string, unknown>>;
const asKeys = (value: unknown): Keys => (typeof value === "object" && value !== null ? (value as Keys) : {});

/** Whether an expression names a column: the name, with nothing before or after it that would make it another. */
function names(expression: unknown, column: string): boolean {
  const escaped = column.replace(/[.*+?^${}()|[\]\\]/g, "\\$&");
  return new RegExp(`(^|[^\\p{L}\\p{N}_])${escaped}($|[^\\p{L}\\p{N}_])`, "u").test(String(expression ?? ""));
}

/** The columns that systems on a data cell take as demographics. */
export function demographicsOn(name: string, cells: readonly CellSource[]): string[] {
  return cells.flatMap(({ kind, source }) => {
    const { data, demographics } = kind === "system" ? parseCell(kind, source).written : {};
    return data === name && Array.isArray(demographics) ? demographics.map(String) : [];
  });
}

/** What a data cell's source uses each column for: "price of grains", "weight", "log_size and keep"; none when it does not. */
export function usesOfColumns(
  source: string,
  columns: readonly string[],
  demographics: readonly string[] = [],
): Map<string, string> {
  const { written } = parseCell("data", source);
  const goods = Object.entries(asKeys(written.goods));
  const derived = Object.entries(asKeys(written.derive));
  const uses = new Map<string, string>();
  for (const column of columns) {
    const words = [
      ...goods.flatMap(([good, mapping]) =>
        Object.entries(asKeys(mapping)).flatMap(([key, name]) => (name === column ? [usedBy(key, good)] : [])),
      ),
      ...ROLES.flatMap(([key, role]) => (written[key] === column ? [role] : [])),
      ...derived.flatMap(([name, expression]) => (names(expression, column) ? [name] : [])),
      ...(names(written.keep, column) ? ["keep"] : []),
      ...(demographics.includes(column) ? ["demographic"] : []),
    ];
    if (words.length > 0) uses.set(column, listWords(words));
  }
  return uses;
}

function usedBy(key: string, good: string): string {
  const name = good.charAt(0).toLowerCase() + good.slice(1);
  return key === "expenditure" ? `expenditure on ${name}` : `${key} of ${name}`;
}
