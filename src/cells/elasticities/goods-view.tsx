import type { ElasticitiesFinding, ElasticityGroup } from "../../../shared/schemas/elasticities.ts";
import { conditionally, titled } from "../../../shared/tables/conditional.ts";
import { BY_GOOD, byGood } from "../../../shared/tables/elasticities.ts";
import { whereOf } from "../../../shared/tables/elasticity-words.ts";
import { DECIMALS, printFixed } from "../../../shared/tables/numbers.ts";
import { Table } from "../../components/table.tsx";
import { GoodHead } from "./good-head.tsx";
import { type Below, ElasticityEstimate } from "./one-estimate.tsx";
import { ClassWord } from "./shapes.tsx";

interface GoodsProps {
  readonly finding: ElasticitiesFinding;
  readonly group: ElasticityGroup;
  readonly below: Below;
}

/** One group, a line for each good: its share, its elasticities, and what it is. */
export function GoodsView({ finding, group, below }: GoodsProps) {
  return (
    <Table
      caption={`${titled(finding, "elasticities")} ${whereOf(finding, group.name)}${conditionally(finding)}`}
      heads={[
        { key: "good", content: "Good" },
        { key: "share", content: "Share" },
        { key: "expenditure", content: "Expenditure" },
        { key: "own price", content: "Own price" },
        { key: "own price, compensated", content: "Compensated" },
        { key: "class", content: "Which makes it", align: "left" },
      ]}
      lines={finding.goods.map((good, i) => ({
        key: good,
        head: <GoodHead finding={finding} group={group} good={good} />,
        cells: [
          printFixed(group.shares[i], DECIMALS.share),
          ...BY_GOOD.map((which) => <ElasticityEstimate key={which} one={byGood(group, which, i)} below={below} />),
          <ClassWord key="class" kind={group.classes[i].kind} />,
        ],
      }))}
    />
  );
}
