import type { FigureFinding, FigureName, FindingOfFigure } from "../schemas/figure.ts";
import type { Estimate, Estimates } from "../schemas/price-change.ts";
import { estimateCell, numberCell, percentCell } from "./cells.ts";
import { conditionally } from "./conditional.ts";
import { FIGURE_TITLES, figureNotes } from "./figure-words.ts";
import { DECIMALS, digitsForAll, printCount, printFixed } from "./numbers.ts";
import { capital } from "./phrases.ts";
import { withArticle } from "./slutsky-matrix.ts";
import type { LabelledTable, TableCell, TableColumn, TableRow } from "./table.ts";

type Part = Pick<LabelledTable, "corner" | "columns" | "rows">;
type Parts = { readonly [S in FigureName]: (finding: FindingOfFigure<S>) => Part };

const PARTS: Parts = {
  "engel curves": engelRows,
  "demand curve": demandRows,
  elasticities: elasticityRows,
  "fit of shares": fitRows,
  "largest eigenvalue": eigenvalueRows,
  incidence: incidenceRows,
  "shares by group": sharesRows,
  "price distribution": priceRows,
};

/** The numbers behind a figure, every one that is drawn. */
export function figureTable(finding: FigureFinding): LabelledTable {
  const { show } = finding.drawn;
  const part = PARTS[show] as (one: FigureFinding) => Part;
  const where = finding.pointName === undefined ? "" : `, ${aside(show)} at ${withArticle(finding.pointName)}`;
  const { drawn } = finding;
  const of = "good" in drawn ? `, ${drawn.good}` : "";
  const by = "groupedBy" in drawn && drawn.groupedBy ? `, by ${drawn.groupedBy.of}` : "";
  return {
    name: `figure-${show.replaceAll(" ", "-")}`,
    title: `${FIGURE_TITLES[show]}${of}${by}${where}${conditionally(finding)}`,
    ...part(finding),
    notes: figureNotes(finding),
  };
}

/** What stays at the point. */
function aside(show: FigureName): string {
  if (show === "elasticities") return "evaluated";
  return show === "demand curve" ? "everything else" : "prices";
}

/** The finding's tables, the one to copy first. */
export const figureTables = (finding: FigureFinding): LabelledTable[] => [figureTable(finding)];

/** Estimate over error, then the ends of the interval that is drawn: three columns of each estimate. */
const withEnds = (label: string): TableColumn[] => [{ label }, { label: `${label}, from` }, { label: `${label}, to` }];

function threeCells({ value, error, low, high }: Estimate, decimals: number): TableCell[] {
  return [estimateCell(value, error, decimals), plain(low, decimals), plain(high, decimals)];
}

const plain = (value: number, decimals: number): TableCell => ({
  kind: "number",
  value,
  printed: printFixed(value, decimals),
});

const one = ({ values, errors, low, high }: Estimates, i: number): Estimate => ({
  value: values[i],
  error: errors[i],
  low: low[i],
  high: high[i],
});

/** A row for each point of an axis, which is a column of its own so that it copies as a number. */
function alongAxis(
  axis: string,
  at: readonly number[],
  curves: readonly (readonly [string, Estimates, number])[],
): Part {
  return {
    corner: "Point",
    columns: [{ label: axis }, ...curves.flatMap(([label]) => withEnds(label))],
    rows: at.map((x, t) => ({
      label: printCount(t + 1),
      cells: [numberCell(x, "money"), ...curves.flatMap(([, of, decimals]) => threeCells(one(of, t), decimals))],
    })),
  };
}

function engelRows({ drawn }: FindingOfFigure<"engel curves">): Part {
  const curves = drawn.curves.map(({ good, ...of }) => [capital(good), of, DECIMALS.share] as const);
  return alongAxis("Expenditure", drawn.totals, curves);
}

function demandRows({ drawn }: FindingOfFigure<"demand curve">): Part {
  const { decimals } = digitsForAll(drawn.uncompensated.values);
  return alongAxis("Price", drawn.prices, [
    ["Uncompensated", drawn.uncompensated, decimals],
    ...(drawn.compensated ? [["Compensated", drawn.compensated, decimals] as const] : []),
  ]);
}

function eigenvalueRows({ drawn }: FindingOfFigure<"largest eigenvalue">): Part {
  return alongAxis("Expenditure", drawn.totals, [["Largest eigenvalue", drawn.eigenvalue, DECIMALS.entry]]);
}

const labelOf = (parts: readonly string[]) => capital(parts.join(", "));

function elasticityRows({ drawn }: FindingOfFigure<"elasticities">): Part {
  const { goods, groups } = drawn;
  return {
    corner: groups.length > 1 ? "Good and group" : "Good",
    columns: ["Expenditure", "Own price", "Own price, compensated"].flatMap(withEnds),
    rows: goods.flatMap((good, i) =>
      groups.map(
        ({ name, expenditure, own, ownCompensated }): TableRow => ({
          label: labelOf(groups.length > 1 ? [good, name] : [good]),
          cells: [expenditure, own, ownCompensated].flatMap((of) => threeCells(one(of, i), DECIMALS.elasticity)),
        }),
      ),
    ),
  };
}

const countCell = (count: number): TableCell => ({ kind: "number", value: count, printed: printCount(count) });

function fitRows({ drawn }: FindingOfFigure<"fit of shares">): Part {
  return {
    corner: "Good and bin",
    columns: [{ label: "Rows" }, { label: "Weight" }, { label: "Predicted" }, ...withEnds("Observed")],
    rows: drawn.goods.flatMap(({ good, bins }) =>
      bins.map(
        ({ rows, weightShare, predicted, observed }, bin): TableRow => ({
          label: labelOf([good, printCount(bin + 1)]),
          cells: [
            countCell(rows),
            percentCell(weightShare),
            numberCell(predicted, "share"),
            ...threeCells(observed, DECIMALS.share),
          ],
        }),
      ),
    ),
  };
}

function incidenceRows({ drawn }: FindingOfFigure<"incidence">): Part {
  const { groups, all, measure } = drawn;
  const loss = measure === "second order" ? "Loss to second order" : "Compensating variation";
  const row = (group: typeof all, total: boolean): TableRow => ({
    label: capital(group.name),
    cells: [
      countCell(group.rows),
      percentCell(group.weightShare),
      ...threeCells(group.share, DECIMALS.share),
      ...threeCells(group.amount, DECIMALS.money),
    ],
    ...(total && { total: true }),
  });
  return {
    corner: "Rows",
    columns: [
      { label: "Rows used" },
      { label: "Weight" },
      ...withEnds(`${loss} by expenditure`),
      ...withEnds(`${loss}, money`),
    ],
    rows: [...groups.map((group) => row(group, false)), row(all, true)],
  };
}

function sharesRows({ drawn }: FindingOfFigure<"shares by group">): Part {
  return {
    corner: "Group",
    columns: [
      { label: "Rows" },
      { label: "Weight" },
      { label: "Expenditure" },
      ...drawn.goods.flatMap((good) => withEnds(capital(good))),
    ],
    rows: drawn.groups.map(({ name, rows, weightShare, total, shares }) => ({
      label: capital(name),
      cells: [
        countCell(rows),
        percentCell(weightShare),
        numberCell(total, "money"),
        ...drawn.goods.flatMap((_, i) => threeCells(one(shares, i), DECIMALS.share)),
      ],
    })),
  };
}

function priceRows({ drawn }: FindingOfFigure<"price distribution">): Part {
  const { edges, shares } = drawn;
  return {
    corner: "Bin",
    columns: [{ label: "Price from" }, { label: "to" }, { label: "Part of the weight" }],
    rows: shares.map((part, bin) => ({
      label: printCount(bin + 1),
      cells: [numberCell(edges[bin], "money"), numberCell(edges[bin + 1], "money"), percentCell(part)],
    })),
  };
}
