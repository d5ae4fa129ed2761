import { byGood } from "../../../shared/tables/elasticities.ts";
import { whereOf } from "../../../shared/tables/elasticity-words.ts";
import { DECIMALS, printFixed } from "../../../shared/tables/numbers.ts";
import type { TwoStageFinding } from "../../../shared/tables/two-stage.ts";
import { Table } from "../../components/table.tsx";
import { GoodHead } from "./good-head.tsx";
import { type Below, ElasticityEstimate } from "./one-estimate.tsx";
import { ClassWord } from "./shapes.tsx";

const COMPARED = ["expenditure", "own price"] as const;

/** Given what is spent on the group, and given the whole budget: a line for each good, the two beside each other. */
export function StagesView({ finding, below }: { finding: TwoStageFinding; below: Below }) {
  const { goods, groups, unconditional } = finding;
  const [conditional] = groups;
  const whole = { ...conditional, ...unconditional };
  const { group } = unconditional;
  return (
    <Table
      caption={`Elasticities conditional on ${group} expenditure and unconditional, ${whereOf(finding, conditional.name)}`}
      heads={[
        { key: "good", content: "Good" },
        { key: "share", content: `Share of ${group}` },
        { key: "expenditure", content: "Expenditure, conditional" },
        { key: "expenditure, unconditional", content: "unconditional", label: "Expenditure, unconditional" },
        { key: "own price", content: "Own price, conditional" },
        { key: "own price, unconditional", content: "unconditional", label: "Own price, unconditional" },
        { key: "class", content: "Unconditionally", align: "left" },
      ]}
      lines={goods.map((good, i) => ({
        key: good,
        head: <GoodHead finding={finding} group={conditional} good={good} table="both stages" />,
        cells: [
          printFixed(conditional.shares[i], DECIMALS.share),
          ...COMPARED.flatMap((which) => [
            <ElasticityEstimate key={which} one={byGood(conditional, which, i)} below={below} />,
            <ElasticityEstimate key={`${which}, whole`} one={byGood(whole, which, i)} below={below} />,
          ]),
          <ClassWord key="class" kind={unconditional.classes[i].kind} />,
        ],
      }))}
    />
  );
}
