import { useId, useState } from "react";
import { capital } from "../../../shared/study/words.ts";
import { entryOf } from "../../../shared/tables/elasticities.ts";
import { DECIMALS, printFixed } from "../../../shared/tables/numbers.ts";
import { groupTable, othersTable, type TwoStageFinding } from "../../../shared/tables/two-stage.ts";
import { SwitchWords } from "../../components/switch-words.tsx";
import { Table } from "../../components/table.tsx";
import { CopyTable } from "../copy-table.tsx";
import { type Below, ElasticityEstimate } from "./one-estimate.tsx";

type Which = "uncompensated" | "compensated";

interface BroaderProps {
  readonly finding: TwoStageFinding;
  readonly below: Below;
}

/** The broader system's part: the group as one of its goods, and what the prices of its other goods do. */
export function BroaderView({ finding, below }: BroaderProps) {
  const id = useId();
  const [which, setWhich] = useState<Which>("uncompensated");
  const { asGood, group, others } = finding.unconditional;
  return (
    <section aria-labelledby={id} className="space-y-2 border-line border-t pt-4">
      <h2 id={id} className="type-section">
        {capital(group)} in the broader system
      </h2>
      <Table
        caption={`${capital(group)} as one good of the broader system`}
        heads={[
          { key: "group", content: "Group" },
          { key: "share", content: "Share" },
          { key: "expenditure", content: "Expenditure" },
          { key: "own price", content: "Own price" },
          { key: "compensated", content: "Compensated" },
        ]}
        lines={[
          {
            key: group,
            head: capital(group),
            cells: [
              printFixed(asGood.share, DECIMALS.share),
              ...(["expenditure", "uncompensated", "compensated"] as const).map((of) => (
                <ElasticityEstimate key={of} one={asGood[of]} below={below} />
              )),
            ],
          },
        ]}
      />
      <CopyTable table={groupTable(finding)} />
      <div className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1 pt-2">
        <p className="type-small text-ink2">
          What one per cent more of the price of another good of the broader system does to the good of the row.
        </p>
        <SwitchWords
          label="Which elasticities to other prices"
          value={which}
          onChange={setWhich}
          words={[
            { value: "uncompensated", word: "Uncompensated" },
            { value: "compensated", word: "Compensated" },
          ]}
        />
      </div>
      <Table
        caption={`Unconditional ${which} elasticities with respect to other prices`}
        heads={[
          { key: "good", content: "Good by price of" },
          ...others.goods.map((good) => ({ key: good, content: capital(good) })),
        ]}
        lines={finding.goods.map((good, i) => ({
          key: good,
          head: capital(good),
          cells: others.goods.map((other, s) => (
            <ElasticityEstimate key={other} one={entryOf(others[which], i, s)} below={below} />
          )),
        }))}
      />
      <CopyTable table={othersTable(finding, which)} />
    </section>
  );
}
