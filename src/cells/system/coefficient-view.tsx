import { useId, useState } from "react";
import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { capital } from "../../../shared/study/words.ts";
import {
  type CoefficientRow,
  coefficientRows,
  isPriceBlock,
  priceMatrices,
} from "../../../shared/tables/coefficients.ts";
import { printFixed, THIN_SPACE } from "../../../shared/tables/numbers.ts";
import { AnchorMark } from "../../components/anchor-mark.tsx";
import { Estimate } from "../../components/number.tsx";
import { SwitchWords } from "../../components/switch-words.tsx";
import { TableScroller } from "../../components/table-scroller.tsx";
import { commonTop, EngelCurve } from "./engel-curve.tsx";

function RowLabel({ row }: { row: CoefficientRow }) {
  if (isPriceBlock(row.block)) {
    return (
      <>
        ln <i className="font-serif">p</i>
        {row.label.slice("ln p".length)}
      </>
    );
  }
  if (row.block === "beta") {
    return (
      <>
        ln <i className="font-serif">x</i>, <i className="font-serif">{row.symbol}</i>
      </>
    );
  }
  return (
    <>
      {row.label} {row.symbol && <i className="font-serif">{row.symbol}</i>}
    </>
  );
}

/** The row's name in letters only, as a remark on it has it. */
const rowName = ({ label, symbol }: CoefficientRow) => [label, symbol].filter(Boolean).join(" ");

interface RowProps {
  readonly row: CoefficientRow;
  readonly goods: readonly string[];
  /** Intervals under the estimates instead of standard errors. */
  readonly intervals: boolean;
}

function Row({ row, goods, intervals }: RowProps) {
  return (
    <tr>
      <th scope="row" className="sticky left-0 min-w-22 bg-recto py-0.5 pr-3 text-left font-normal">
        <RowLabel row={row} />
        <AnchorMark of={`row ${rowName(row)}`} />
      </th>
      {row.cells.map((cell, index) => (
        <td key={goods[index]} className="relative py-0.5 pr-[0.33em] pl-3 text-right align-top">
          {cell.kind === "estimate" && (
            <Estimate
              value={cell.printed}
              error={cell.printedError}
              interval={intervals ? cell.printedInterval : undefined}
            />
          )}
          <span className="entry-mark">
            <AnchorMark of={`entry ${rowName(row)}, ${capital(goods[index])}`} />
          </span>
        </td>
      ))}
    </tr>
  );
}

/** Nothing where no level of shares is predicted. */
function CurveHeads({ finding }: { finding: SystemFinding }) {
  const { goods } = finding.fitted;
  const { logTotal, shares } = finding.engel;
  if (logTotal.length === 0) return null;
  const top = commonTop(shares);
  return (
    <tr className="border-line border-b">
      <td className="type-smallest sticky left-0 min-w-22 bg-recto pr-3 pb-1.5 align-bottom text-ink2">
        Share against ln <i className="font-serif">x</i>, 0 to {printFixed(top, 2)}
      </td>
      {goods.map((good, i) => (
        <td key={good} className="pr-[0.33em] pb-1 pl-2 align-bottom">
          <EngelCurve logTotal={logTotal} shares={shares[i]} top={top} />
          <span className="sr-only">
            share of {good} from {printFixed(shares[i][0], 2)} to {printFixed(shares[i][shares[i].length - 1], 2)} as
            expenditure rises
          </span>
        </td>
      ))}
    </tr>
  );
}

function Heads({ finding }: { finding: SystemFinding }) {
  const { goods } = finding.fitted;
  const hasCurves = finding.engel.logTotal.length > 0;
  return (
    <thead>
      <tr className={hasCurves ? "" : "border-line border-b"}>
        <th scope="col" className="type-small sticky left-0 bg-recto text-left align-bottom font-normal text-ink2">
          Share equation
        </th>
        {goods.map((good) => (
          <th key={good} scope="col" className="type-small pr-[0.33em] pl-2 text-right align-bottom font-semibold">
            {capital(good)}
          </th>
        ))}
      </tr>
      <CurveHeads finding={finding} />
    </thead>
  );
}

const UNDER = [
  { value: "errors", word: "Standard errors" },
  { value: "intervals", word: `95${THIN_SPACE}% intervals` },
] as const;

/** Coefficients as a paper prints them; the price terms, n × n of them, wait folded. */
export function CoefficientView({ finding }: { finding: SystemFinding }) {
  const [unfolded, setUnfolded] = useState(false);
  const [intervals, setIntervals] = useState(false);
  const id = useId();
  const { goods } = finding.fitted;
  const rows = coefficientRows(finding);
  const priceRows = rows.filter((row) => isPriceBlock(row.block));
  const others = rows.filter((row) => !isPriceBlock(row.block));
  const under = intervals ? `95${THIN_SPACE}% interval` : "standard error";
  return (
    <div>
      {finding.bootstrap && (
        <div className="type-small mb-1.5 flex flex-wrap items-baseline justify-between gap-x-4 text-ink2">
          <span>
            {intervals
              ? `Estimate over 95${THIN_SPACE}% interval, percentiles of the bootstrap’s draws`
              : "Estimate over (standard error)"}
          </span>
          <SwitchWords
            label="Under the estimates"
            words={UNDER}
            value={intervals ? "intervals" : "errors"}
            onChange={(value) => setIntervals(value === "intervals")}
          />
        </div>
      )}
      <TableScroller label="Coefficients of the share equations">
        <table className={`type-table w-full ${priceRows.length === 0 ? "border-line border-b" : ""}`}>
          <caption className="sr-only">Coefficients of the share equations, estimate over {under}</caption>
          <Heads finding={finding} />
          <tbody>
            {others.map((row) => (
              <Row key={row.block + row.label} row={row} goods={goods} intervals={intervals} />
            ))}
          </tbody>
          {unfolded && (
            <tbody id={id}>
              {priceRows.map((row) => (
                <Row key={row.block + row.label} row={row} goods={goods} intervals={intervals} />
              ))}
            </tbody>
          )}
        </table>
      </TableScroller>
      {priceRows.length > 0 && (
        <div className="border-line border-b pb-1">
          <button
            type="button"
            aria-expanded={unfolded}
            aria-controls={unfolded ? id : undefined}
            className="word type-small"
            onClick={() => setUnfolded(!unfolded)}
          >
            {unfolded ? "Fold the price terms" : "Price terms"} {priceMatrices(priceRows)}, {goods.length} ×{" "}
            {goods.length}
          </button>
        </div>
      )}
    </div>
  );
}
