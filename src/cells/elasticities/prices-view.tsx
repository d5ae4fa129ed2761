import { useId, useState } from "react";
import type { ElasticitiesFinding, ElasticityGroup } from "../../../shared/schemas/elasticities.ts";
import { capital } from "../../../shared/study/words.ts";
import { conditionally, titled } from "../../../shared/tables/conditional.ts";
import { entryOf, priceTable } from "../../../shared/tables/elasticities.ts";
import { whereOf } from "../../../shared/tables/elasticity-words.ts";
import { SwitchWords } from "../../components/switch-words.tsx";
import { Table } from "../../components/table.tsx";
import { CopyTable } from "../copy-table.tsx";
import { GoodHead } from "./good-head.tsx";
import { type Below, ElasticityEstimate } from "./one-estimate.tsx";
import { PairMark, SignMark } from "./shapes.tsx";

interface PricesProps {
  readonly finding: ElasticitiesFinding;
  readonly group: ElasticityGroup;
  readonly below: Below;
}

type Which = "uncompensated" | "compensated";

/** What is held; in a group's own system that is what is spent on the group, and the utility of its goods. */
function saysOf(which: Which, { conditionalOn }: ElasticitiesFinding): string {
  const total = conditionalOn === undefined ? "total expenditure" : `${conditionalOn} expenditure`;
  const utility = conditionalOn === undefined ? "utility" : `the utility of ${conditionalOn}`;
  const held = which === "compensated" ? utility : total;
  return `What one per cent more of the price of the column does to the good of the row, ${held} held.`;
}

/** All price elasticities of a group, uncompensated or compensated, with the pairs that are beyond doubt marked. */
export function PricesView({ finding, group, below }: PricesProps) {
  const id = useId();
  const [which, setWhich] = useState<Which>("uncompensated");
  const pairs = which === "compensated" ? group.net : group.gross;
  const kind = which === "compensated" ? "net" : "gross";
  return (
    <section aria-labelledby={id} className="space-y-2 border-line border-t pt-4">
      <div className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1">
        <h2 id={id} className="type-section">
          {titled(finding, "price elasticities")}
          {conditionally(finding)}
        </h2>
        <SwitchWords
          label="Which price elasticities"
          value={which}
          onChange={setWhich}
          words={[
            { value: "uncompensated", word: "Uncompensated" },
            { value: "compensated", word: "Compensated" },
          ]}
        />
      </div>
      <p className="type-small text-ink2">{saysOf(which, finding)}</p>
      <Table
        caption={`${titled(finding, `${which} price elasticities`)} ${whereOf(finding, group.name)}${conditionally(finding)}`}
        heads={[
          { key: "good", content: "Good by price of" },
          ...finding.goods.map((good) => ({ key: good, content: capital(good) })),
        ]}
        lines={finding.goods.map((good, i) => ({
          key: good,
          head: <GoodHead finding={finding} group={group} good={good} table={which} />,
          cells: finding.goods.map((other, j) => (
            <span key={other} className="inline-flex items-baseline">
              <ElasticityEstimate
                one={entryOf(group[which], i, j)}
                below={below}
                mark={<PairMark pair={pairs[i][j]} />}
              />
            </span>
          )),
        }))}
      />
      <div className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1">
        <p className="type-small text-ink2">
          <SignMark pair="substitutes" />
          {kind} substitutes, <SignMark pair="complements" />
          {kind} complements; without a mark the interval covers 0.
        </p>
        <CopyTable table={priceTable(finding, group, which)} />
      </div>
    </section>
  );
}
