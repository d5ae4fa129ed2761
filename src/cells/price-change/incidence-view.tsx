import type { Incidence, IncidenceGroup } from "../../../shared/schemas/price-change.ts";
import { capital } from "../../../shared/study/words.ts";
import { FEW_ROWS } from "../../../shared/tables/elasticity-words.ts";
import { DECIMALS, printCount, printFixed, printPercent } from "../../../shared/tables/numbers.ts";
import { AnchorMark } from "../../components/anchor-mark.tsx";
import { Estimate } from "../../components/number.tsx";
import { TableScroller } from "../../components/table-scroller.tsx";

const CAPTION = "Who bears it";
const HEAD = "pb-1.5 align-bottom type-small font-normal text-ink2";
const CELL = "whitespace-nowrap py-1 pr-[0.33em] pl-4 text-right align-top";
const BAR = 116;

const money = (value: number) => printFixed(value, DECIMALS.money);

/** The loss by expenditure: exact where there is a cost function, else to second order. */
const lossShare = ({ welfareShare, secondOrderShare }: IncidenceGroup) =>
  welfareShare?.compensating ?? secondOrderShare;

function columnsOf({ all }: Incidence) {
  const { welfare, perAdult, tax } = all;
  return [
    { head: "Rows", of: (group: IncidenceGroup) => <Rows group={group} /> },
    { head: "Expenditure", of: ({ expenditure }: IncidenceGroup) => money(expenditure) },
    ...(perAdult === undefined
      ? []
      : [{ head: "Per adult", of: (group: IncidenceGroup) => money(group.perAdult ?? Number.NaN) }]),
    ...(welfare
      ? [
          {
            head: "Compensating variation",
            of: ({ welfare: own }: IncidenceGroup) => <Money one={own?.compensating} />,
          },
          { head: "Equivalent variation", of: ({ welfare: own }: IncidenceGroup) => <Money one={own?.equivalent} /> },
        ]
      : [{ head: "Loss to second order", of: ({ secondOrder }: IncidenceGroup) => <Money one={secondOrder} /> }]),
    ...(tax ? [{ head: "Tax paid", of: ({ tax: own }: IncidenceGroup) => <Money one={own?.revenue} /> }] : []),
    ...(tax?.excessBurden
      ? [{ head: "Excess burden", of: ({ tax: own }: IncidenceGroup) => <Money one={own?.excessBurden} /> }]
      : []),
  ];
}

function Money({ one }: { one: { readonly value: number; readonly error: number } | undefined }) {
  return one ? <Estimate value={money(one.value)} error={money(one.error)} /> : null;
}

/** How many rows; where they are few, by a word and not by colour alone. */
function Rows({ group: { rows, notDefined } }: { group: IncidenceGroup }) {
  return (
    <>
      {printCount(rows)}
      {rows < FEW_ROWS && <span className="block text-stale">few rows</span>}
      {notDefined && (
        <span className="block text-[0.78125rem]/[0.9375rem] text-ink2">{printCount(notDefined.rows)} left out</span>
      )}
    </>
  );
}

/** Means over the rows of each group, and over all: losses, and how much of expenditure they are. */
export function IncidenceView({ incidence }: { incidence: Incidence }) {
  const { groups, all, groupedBy } = incidence;
  const columns = columnsOf(incidence);
  const percent = (value: number) => printFixed(100 * value, decimals);
  // One more decimal than per cents have, where a standard error would print as nothing.
  const decimals = DECIMALS.percent + ([...groups, all].some((group) => 100 * lossShare(group).error < 0.05) ? 1 : 0);
  const most = Math.max(...[...groups, all].map((group) => Math.abs(lossShare(group).value)), Number.MIN_VALUE);
  return (
    <TableScroller label={CAPTION}>
      <table className="type-table w-full border-line border-b">
        <caption className="sr-only">{CAPTION}</caption>
        <thead>
          <tr className="border-line border-b">
            <th scope="col" className={`sticky left-0 bg-recto pr-3 text-left ${HEAD}`}>
              {groupedBy ? capital(groupedBy.of) : "Rows"}
            </th>
            {columns.map(({ head }) => (
              <th key={head} scope="col" className={`max-w-28 pr-[0.33em] pl-4 text-right ${HEAD}`}>
                {head}
              </th>
            ))}
            <th scope="col" className={`max-w-40 pr-[0.33em] pl-4 text-right ${HEAD}`}>
              Loss, per cent of expenditure
            </th>
          </tr>
        </thead>
        <tbody>
          {[...groups, all].map((group, index) => {
            const isAll = index === groups.length;
            const loss = lossShare(group);
            return (
              <tr key={group.name} className={isAll ? "border-line border-t font-semibold" : ""}>
                <th
                  scope="row"
                  className={`sticky left-0 bg-recto py-1 pr-3 text-left align-top ${isAll ? "" : "font-normal"}`}
                >
                  {capital(group.name)}
                  <AnchorMark of={`row ${capital(group.name)}`} />
                </th>
                {columns.map(({ head, of }) => (
                  <td key={head} className={CELL}>
                    {of(group)}
                  </td>
                ))}
                <td className={CELL}>
                  <span className="inline-flex items-start gap-3">
                    <LossBar part={loss.value / most} />
                    <Estimate value={percent(loss.value)} error={percent(loss.error)} />
                  </span>
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </TableScroller>
  );
}

/** A gain is drawn open: it has the other sign. */
function LossBar({ part }: { part: number }) {
  return (
    <svg aria-hidden="true" width={BAR} height="20" className="max-[1023px]:hidden">
      <path d={`M0 10H${BAR}`} stroke="var(--rule)" />
      <rect
        x="0.5"
        y="7.5"
        width={Math.max(0.5, Math.abs(part) * (BAR - 1))}
        height="5"
        fill={part < 0 ? "var(--recto)" : "var(--ink2)"}
        stroke="var(--ink2)"
      />
    </svg>
  );
}

/** How the groups are made and counted, above their table. */
export function incidenceSays({ groupedBy, all }: Incidence): string {
  const by = groupedBy?.quantiles ? " Groups are of equal weight, lowest first." : "";
  const without = all.notDefined ? ` ${printPercent(all.notDefined.weightedShare)} of the weight is left out.` : "";
  return `Weighted means a household, each at its own prices and total, in the units uploaded; losses are positive. Estimate over (standard error).${by}${without}`;
}
