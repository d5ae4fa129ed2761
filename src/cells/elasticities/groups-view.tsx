import { useId } from "react";
import { type ElasticitiesFinding, TOTAL_EXPENDITURE } from "../../../shared/schemas/elasticities.ts";
import { capital } from "../../../shared/study/words.ts";
import { conditionally } from "../../../shared/tables/conditional.ts";
import { type ByGood, byGood } from "../../../shared/tables/elasticities.ts";
import { groupHead } from "../../../shared/tables/elasticity-words.ts";
import { DECIMALS, printCount, printFixed } from "../../../shared/tables/numbers.ts";
import { AnchorMark } from "../../components/anchor-mark.tsx";
import { SwitchWords } from "../../components/switch-words.tsx";
import { TableScroller } from "../../components/table-scroller.tsx";
import { type Below, ElasticityEstimate } from "./one-estimate.tsx";

/** Which elasticity the groups are compared by. */
export function ByGoodSwitch({ which, onChange }: { which: ByGood; onChange: (which: ByGood) => void }) {
  return (
    <SwitchWords
      label="Compared by"
      value={which}
      onChange={onChange}
      words={[
        { value: "expenditure", word: "Expenditure" },
        { value: "own price", word: "Own price" },
        { value: "own price, compensated", word: "Compensated" },
      ]}
    />
  );
}

interface GroupsProps {
  readonly finding: ElasticitiesFinding;
  readonly which: ByGood;
  readonly below: Below;
  /** The group spoken of below; without it none can be chosen. */
  readonly chosen?: number;
  readonly onChoose?: (group: number) => void;
}

const CAPTIONS: Readonly<Record<ByGood, string>> = {
  expenditure: "Expenditure elasticities by group",
  "own price": "Own-price elasticities by group",
  "own price, compensated": "Compensated own-price elasticities by group",
};

const HEAD = "pb-1.5 align-bottom type-small font-normal text-ink2";

/** Several groups, a line for each and a column for each good; a line's head chooses the group that is set out below. */
export function GroupsView({ finding, which, below, chosen, onChoose }: GroupsProps) {
  const name = useId();
  const { goods, groups } = finding;
  const caption = `${CAPTIONS[which]}${conditionally(finding)}`;
  return (
    <TableScroller label={caption}>
      <table className="type-table w-full border-line border-b">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr className="border-line border-b">
            <th scope="col" className={`sticky left-0 bg-recto pr-3 text-left ${HEAD}`}>
              {finding.groupedBy?.of === TOTAL_EXPENDITURE
                ? capital(TOTAL_EXPENDITURE)
                : (finding.groupedBy?.of ?? "Group")}
            </th>
            <th scope="col" className={`pl-3 text-right ${HEAD}`}>
              Rows
            </th>
            <th scope="col" className={`pl-3 text-right ${HEAD}`}>
              Spends
            </th>
            {goods.map((good) => (
              <th key={good} scope="col" className={`pr-[0.33em] pl-3 text-right ${HEAD}`}>
                {capital(good)}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {groups.map((group, g) => (
            <tr key={group.name}>
              <th scope="row" className="sticky left-0 min-w-26 bg-recto py-1 pr-3 text-left align-top font-normal">
                {onChoose ? (
                  <label className="flex min-h-6 cursor-pointer items-baseline gap-2.5 max-[599px]:min-h-11">
                    <input
                      type="radio"
                      name={name}
                      checked={g === chosen}
                      onChange={() => onChoose(g)}
                      className="m-0 size-2.5 shrink-0 appearance-none rounded-full border border-ctl checked:border-ink checked:bg-ink"
                    />
                    <span className={g === chosen ? "font-semibold" : ""}>
                      {groupHead(finding.groupedBy, group.name)}
                    </span>
                  </label>
                ) : (
                  groupHead(finding.groupedBy, group.name)
                )}
                <AnchorMark of={`row ${capital(groupHead(finding.groupedBy, group.name))}`} />
              </th>
              <td className="py-1 pl-3 text-right align-top">{printCount(group.rows ?? 0)}</td>
              <td className="py-1 pl-3 text-right align-top">{printFixed(group.total, DECIMALS.money)}</td>
              {goods.map((good, i) => (
                <td key={good} className="whitespace-nowrap py-1 pr-[0.33em] pl-3 text-right align-top">
                  <ElasticityEstimate one={byGood(group, which, i)} below={below} />
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </TableScroller>
  );
}
