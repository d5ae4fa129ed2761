import type { SystemFinding } from "../schemas/system.ts";
import { EMPTY, estimateCell } from "./cells.ts";
import { type CoefficientRow, coefficientRows, isPriceBlock } from "./coefficients.ts";
import { printFixed } from "./numbers.ts";
import { countedRows } from "./phrases.ts";
import type { LabelledTable, TableCell, TableRow } from "./table.ts";

export interface ComparedEstimate {
  readonly value: number;
  readonly error: number;
}

/** The same number in two systems; a side is absent where that system has no such number. */
export interface Pair {
  readonly left?: ComparedEstimate;
  readonly right?: ComparedEstimate;
}

/** Numbers of one name, a pair for each good. */
export interface ComparedRow {
  readonly key: string;
  readonly label: string;
  readonly symbol?: string;
  /** Price terms, n for each good, are looked at when asked for. */
  readonly isPrice: boolean;
  readonly pairs: readonly Pair[];
}

export interface Compared {
  /** Of both systems: those of the left one first. */
  readonly goods: readonly string[];
  readonly rows: readonly ComparedRow[];
}

type Side = "left" | "right";

/** The right number less the left one; none where a side has none. */
export function differenceOf({ left, right }: Pair): number | undefined {
  return left && right && right.value - left.value;
}

/** Which side alone has the numbers of a row; undefined where both have some. */
export function onlySide({ pairs }: ComparedRow): Side | undefined {
  const has = (side: Side) => pairs.some((pair) => pair[side] !== undefined);
  if (has("left") && has("right")) return undefined;
  return has("left") ? "left" : "right";
}

const union = (left: readonly string[], right: readonly string[]) => [...new Set([...left, ...right])];

/** Coefficients of two systems matched by name and good; those of one system only have one side. */
export function comparedCoefficients(left: SystemFinding, right: SystemFinding): Compared {
  const goods = union(left.fitted.goods, right.fitted.goods);
  const keyed = (finding: SystemFinding) =>
    new Map(coefficientRows(finding).map((row) => [`${row.block}: ${row.label}`, row]));
  const [a, b] = [keyed(left), keyed(right)];
  const rows = union([...a.keys()], [...b.keys()]).map((key) => {
    const [ours, theirs] = [a.get(key), b.get(key)];
    const { label, symbol, block } = (ours ?? theirs) as CoefficientRow;
    return {
      key,
      label,
      ...(symbol !== undefined && { symbol }),
      isPrice: isPriceBlock(block),
      pairs: goods.map((good) => ({
        ...sided("left", estimateIn(ours, left.fitted.goods.indexOf(good))),
        ...sided("right", estimateIn(theirs, right.fitted.goods.indexOf(good))),
      })),
    };
  });
  return { goods, rows };
}

const sided = (side: Side, one: ComparedEstimate | undefined): Pair => (one ? { [side]: one } : {});

function estimateIn(row: CoefficientRow | undefined, place: number): ComparedEstimate | undefined {
  const cell = row?.cells[place];
  return cell?.kind === "estimate" ? { value: cell.value, error: cell.standardError } : undefined;
}

/** Elasticities of one system at a point, n and n × n, with their standard errors. */
export interface ElasticitiesBeside {
  readonly goods: readonly string[];
  readonly expenditure: readonly number[];
  readonly expenditureErrors: readonly number[];
  readonly uncompensated: readonly (readonly number[])[];
  readonly uncompensatedErrors: readonly (readonly number[])[];
  readonly compensated: readonly (readonly number[])[];
  readonly compensatedErrors: readonly (readonly number[])[];
}

/** The elasticities named by one good: expenditure, own price, own price compensated; then every compensated one. */
export const OWN_ELASTICITIES = ["Expenditure", "Own price", "Own price, compensated"] as const;

/** Elasticities of two systems matched by good. */
export function comparedElasticities(left: ElasticitiesBeside, right: ElasticitiesBeside): Compared {
  const goods = union(left.goods, right.goods);
  const pairsOf = (take: (one: ElasticitiesBeside, i: number) => ComparedEstimate | undefined) =>
    goods.map((good) => {
      const at = (one: ElasticitiesBeside) => {
        const i = one.goods.indexOf(good);
        return i < 0 ? undefined : take(one, i);
      };
      return { ...sided("left", at(left)), ...sided("right", at(right)) };
    });
  const [expenditure, own, compensated] = OWN_ELASTICITIES;
  const row = (label: string, isPrice: boolean, pairs: readonly Pair[]): ComparedRow => ({
    key: label,
    label,
    isPrice,
    pairs,
  });
  return {
    goods,
    rows: [
      row(
        expenditure,
        false,
        pairsOf((one, i) => ({ value: one.expenditure[i], error: one.expenditureErrors[i] })),
      ),
      row(
        own,
        false,
        pairsOf((one, i) => ({ value: one.uncompensated[i][i], error: one.uncompensatedErrors[i][i] })),
      ),
      row(
        compensated,
        false,
        pairsOf((one, i) => ({ value: one.compensated[i][i], error: one.compensatedErrors[i][i] })),
      ),
      // A row for each good demanded, a column for each price.
      ...goods.map((demanded) =>
        row(
          `Compensated, ${demanded}`,
          true,
          pairsOf((one, j) => {
            const i = one.goods.indexOf(demanded);
            return i < 0 ? undefined : { value: one.compensated[i][j], error: one.compensatedErrors[i][j] };
          }),
        ),
      ),
    ],
  };
}

interface TableWords {
  readonly name: string;
  readonly title: string;
  readonly corner: string;
  /** How the two systems are called. */
  readonly names: readonly [left: string, right: string];
  readonly decimals: number;
  readonly notes: readonly string[];
}

/** Two systems' numbers as one table: three lines for each name, the two estimates and their difference. */
export function comparedTable({ goods, rows }: Compared, words: TableWords): LabelledTable {
  const { names, decimals, name, title, corner, notes } = words;
  const side = (row: ComparedRow, which: Side): TableRow => ({
    label: `${row.label}, ${names[which === "left" ? 0 : 1]}`,
    cells: row.pairs.map((pair) => estimated(pair[which], decimals)),
  });
  return {
    name,
    title,
    corner,
    columns: goods.map((label) => ({ label })),
    rows: rows.flatMap((row) => {
      const only = onlySide(row);
      if (only) return [side(row, only)];
      return [
        side(row, "left"),
        side(row, "right"),
        { label: `${row.label}, difference`, cells: differences(row, decimals) },
      ];
    }),
    notes,
  };
}

const estimated = (one: ComparedEstimate | undefined, decimals: number): TableCell =>
  one ? estimateCell(one.value, one.error, decimals) : EMPTY;

const differences = ({ pairs }: ComparedRow, decimals: number): TableCell[] =>
  pairs.map((pair) => {
    const value = differenceOf(pair);
    return value === undefined ? EMPTY : { kind: "number", value, printed: printFixed(value, decimals) };
  });

/**
 * "The expenditure elasticities differ by 0.031 at most: dairy, 0.912 in base and 0.943 in linear."; none where no good
 * is in both.
 */
export function largestDifference(
  { goods, rows }: Compared,
  label: (typeof OWN_ELASTICITIES)[number],
  [left, right]: readonly [string, string],
  decimals: number,
): string | undefined {
  const pairs = rows.find((row) => row.label === label)?.pairs ?? [];
  const sizes = pairs.map((pair) => Math.abs(differenceOf(pair) ?? Number.NaN));
  const place = sizes.reduce((most, size, i) => (size > (sizes[most] ?? -1) ? i : most), -1);
  const pair = pairs[place];
  if (!pair?.left || !pair.right) return undefined;
  const kind = label === "Expenditure" ? "expenditure" : "own-price";
  const [one, other] = [pair.left, pair.right].map(({ value }) => printFixed(value, decimals));
  const by = printFixed(sizes[place], decimals);
  if (Number(by) === 0) return `The ${kind} elasticities agree to ${decimals} decimals for every good.`;
  if (one === other) return `The ${kind} elasticities differ by ${by} at most, for ${goods[place]}.`;
  return `The ${kind} elasticities differ by ${by} at most: ${goods[place]}, ${one} in ${left} and ${other} in ${right}.`;
}

/** What is said of two systems that do not rest on the same rows of the same data; nothing where they do. */
export function rowsApart(
  left: { readonly name: string; readonly finding: SystemFinding },
  right: { readonly name: string; readonly finding: SystemFinding },
): string | undefined {
  const [a, b] = [left.finding, right.finding];
  if (a.dataFingerprint !== b.dataFingerprint) {
    return `${left.name} and ${right.name} rest on different data, with ${countedRows(a.rows)} and ${countedRows(b.rows)}: what differs below may be the data and not the systems.`;
  }
  if (a.rows === b.rows) return undefined;
  return `${left.name} rests on ${countedRows(a.rows)} and ${right.name} on ${countedRows(b.rows)}: what differs below may come from the rows that only one of them has.`;
}
