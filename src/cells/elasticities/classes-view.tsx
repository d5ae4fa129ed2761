import { useId } from "react";
import type { ElasticitiesFinding, ElasticityGroup } from "../../../shared/schemas/elasticities.ts";
import { conditionally, isUnconditional } from "../../../shared/tables/conditional.ts";
import { listed } from "../../../shared/tables/phrases.ts";
import { Table } from "../../components/table.tsx";
import { GoodHead } from "./good-head.tsx";

type Pairs = ElasticityGroup["net"][number];

function namesOf(pairs: Pairs, of: "substitutes" | "complements", goods: readonly string[]): string {
  return listed(goods.filter((_, j) => pairs[j] === of)) || "none beyond doubt";
}

/** "normal", "not normal", "income-neutral"; and the Giffen good, where there is one. */
function respondsToIncome({ normal, incomeNeutral, giffen }: ElasticityGroup["classes"][number]): string {
  const words = incomeNeutral ? "undecided, 0 is covered" : normal === "yes" ? "rises" : "falls";
  return giffen === "yes" ? `${words}; a Giffen good` : words;
}

/** How each good of a group answers expenditure, and which others replace or accompany it, beyond doubt. */
export function ClassesView({ finding, group }: { finding: ElasticitiesFinding; group: ElasticityGroup }) {
  const id = useId();
  const goods = group.classes.map(({ good }) => good);
  return (
    <section aria-labelledby={id} className="space-y-2 border-line border-t pt-4">
      <h2 id={id} className="type-section">
        Goods among each other
        {isUnconditional(finding) ? ", unconditional" : conditionally(finding)}
      </h2>
      <Table
        caption="How the goods stand to each other"
        heads={[
          { key: "good", content: "Good" },
          { key: "income", content: "With expenditure it", align: "left" },
          { key: "substitutes", content: "Net substitutes", align: "left" },
          { key: "complements", content: "Net complements", align: "left" },
        ]}
        lines={group.classes.map((one, i) => ({
          key: one.good,
          head: <GoodHead finding={finding} group={group} good={one.good} table="among the goods" />,
          cells: [
            respondsToIncome(one),
            namesOf(group.net[i], "substitutes", goods),
            namesOf(group.net[i], "complements", goods),
          ],
        }))}
      />
    </section>
  );
}
