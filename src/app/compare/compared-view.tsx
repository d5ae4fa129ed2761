import { useState } from "react";
import { capital, counted } from "../../../shared/study/words.ts";
import {
  type Compared,
  type ComparedEstimate,
  type ComparedRow,
  differenceOf,
  onlySide,
  type Pair,
} from "../../../shared/tables/compared.ts";
import { printFixed } from "../../../shared/tables/numbers.ts";
import { Word } from "../../components/button.tsx";
import { Estimate } from "../../components/number.tsx";
import { TableScroller } from "../../components/table-scroller.tsx";
import { SideMark } from "./side-mark.tsx";

interface ViewProps {
  readonly compared: Compared;
  readonly caption: string;
  readonly corner: string;
  readonly names: readonly [string, string];
  readonly decimals: number;
  /** What the folded rows are called. */
  readonly folded: string;
}

const HEAD = "sticky left-0 bg-recto py-0.5 pr-4 text-left font-normal whitespace-nowrap";
const CELL = "pb-0.5 pr-[0.33em] pl-4 text-right align-top whitespace-nowrap";
/** Level with the name of the system, which the first line has below the name of the number. */
const LEVEL = "pt-7";

/** Two systems' numbers, name by name: the left one's line, the right one's, and the difference. */
export function ComparedView({ compared, caption, corner, names, decimals, folded }: ViewProps) {
  const [unfolded, setUnfolded] = useState(false);
  const { goods, rows } = compared;
  const prices = rows.filter(({ isPrice }) => isPrice);
  const shown = unfolded ? rows : rows.filter(({ isPrice }) => !isPrice);
  return (
    <>
      <TableScroller label={caption}>
        <table className="type-table w-full border-line border-b tabular-nums">
          <caption className="sr-only">{caption}</caption>
          <thead>
            <tr className="border-line border-b">
              <th scope="col" className={`${HEAD} type-small pb-1.5 text-ink2`}>
                {corner}
              </th>
              {goods.map((good) => (
                <th key={good} scope="col" className="type-small pr-[0.33em] pb-1.5 pl-4 text-right font-semibold">
                  {capital(good)}
                </th>
              ))}
            </tr>
          </thead>
          {shown.map((row) => (
            <Lines key={row.key} row={row} goods={goods} names={names} decimals={decimals} />
          ))}
        </table>
      </TableScroller>
      {prices.length > 0 && (
        <Word className="type-small mt-1.5" aria-expanded={unfolded} onClick={() => setUnfolded(!unfolded)}>
          {unfolded ? `Fold ${folded}` : `${capital(folded)}, ${counted(prices.length, "row")}`}
        </Word>
      )}
    </>
  );
}

interface LinesProps extends Pick<ViewProps, "names" | "decimals"> {
  readonly row: ComparedRow;
  readonly goods: readonly string[];
}

function Lines({ row, goods, names, decimals }: LinesProps) {
  const only = onlySide(row);
  const label = (
    <>
      {row.label} {row.symbol && <i className="font-serif">{row.symbol}</i>}
    </>
  );
  const line = (side: "left" | "right", isFirst: boolean) => {
    const name = names[side === "left" ? 0 : 1];
    return (
      <tr key={side} className="align-top">
        <th scope="row" className={`${HEAD} ${isFirst ? "pt-1.5" : ""}`}>
          <span className={isFirst ? "block" : "sr-only"}>{label} </span>
          <span className="type-small pl-3 text-ink2">
            <SideMark side={side} />
            {name}
            {only && " only"}
          </span>
        </th>
        {row.pairs.map((pair, i) => (
          <td key={goods[i]} className={`${CELL} ${isFirst ? LEVEL : "pt-0.5"}`}>
            <One estimate={pair[side]} decimals={decimals} />
          </td>
        ))}
      </tr>
    );
  };
  if (only) return <tbody>{line(only, true)}</tbody>;
  return (
    <tbody>
      {line("left", true)}
      {line("right", false)}
      <tr>
        <th scope="row" className={HEAD}>
          <span className="sr-only">{label} </span>
          <span className="type-small pl-3 text-ink2">
            <span aria-hidden="true" className="mr-1.5 inline-block w-[11px]" />
            difference
          </span>
        </th>
        {row.pairs.map((pair, i) => (
          <td key={goods[i]} className={`${CELL} pt-0.5 text-ink2`}>
            <Difference pair={pair} decimals={decimals} />
          </td>
        ))}
      </tr>
    </tbody>
  );
}

function One({ estimate, decimals }: { estimate: ComparedEstimate | undefined; decimals: number }) {
  if (!estimate) return null;
  return <Estimate value={printFixed(estimate.value, decimals)} error={printFixed(estimate.error, decimals)} />;
}

function Difference({ pair, decimals }: { pair: Pair; decimals: number }) {
  const value = differenceOf(pair);
  return value === undefined ? null : printFixed(value, decimals);
}
