import type { SystemFinding } from "../schemas/system.ts";
import { EMPTY, numberCell, textCell } from "./cells.ts";
import { printCount } from "./numbers.ts";
import { capital } from "./phrases.ts";
import { standardErrorsPhrase } from "./standard-errors.ts";
import type { LabelledTable, TableCell } from "./table.ts";

const MEASURES: readonly (readonly [label: string, cell: (finding: SystemFinding) => TableCell])[] = [
  ["Log-likelihood", ({ logLikelihood }) => numberCell(logLikelihood, "statistic")],
  ["Free coefficients", ({ freeCoefficients }) => countCell(freeCoefficients)],
  ["AIC", ({ aic }) => (aic === undefined ? EMPTY : numberCell(aic, "statistic"))],
  ["BIC", ({ bic }) => (bic === undefined ? EMPTY : numberCell(bic, "statistic"))],
  ["System R², McElroy", ({ systemRSquared }) => numberCell(systemRSquared, "fit")],
  ["Rows", ({ rows }) => countCell(rows)],
  ["Estimator", ({ estimator }) => textCell(estimator)],
  ["Standard errors", (finding) => textCell(standardErrorsPhrase(finding))],
];

const countCell = (count: number): TableCell => ({ kind: "number", value: count, printed: printCount(count) });

/** How two systems fit, and R² of every share equation either has. */
export function comparedFit(
  left: SystemFinding,
  right: SystemFinding,
  names: readonly [string, string],
  notes: readonly string[],
): LabelledTable {
  const goods = [...new Set([...left.fitted.goods, ...right.fitted.goods])];
  const rSquared = (finding: SystemFinding, good: string): TableCell => {
    const place = finding.fitted.goods.indexOf(good);
    return place < 0 ? EMPTY : numberCell(finding.rSquared[place], "fit");
  };
  return {
    name: "fit-compared",
    title: `Fit of ${names[0]} and ${names[1]}`,
    corner: "Measure",
    columns: names.map((label) => ({ label })),
    rows: [
      ...MEASURES.map(([label, cell]) => ({ label, cells: [cell(left), cell(right)] })),
      ...goods.map((good) => ({
        label: `R², ${capital(good)}`,
        cells: [rSquared(left, good), rSquared(right, good)],
      })),
    ],
    notes,
  };
}
