import type { ElasticityGroup } from "../../../shared/schemas/elasticities.ts";
import { capital } from "../../../shared/study/words.ts";
import { listed } from "../../../shared/tables/phrases.ts";
import { Table } from "../../components/table.tsx";
import { ClassWord } from "./shapes.tsx";

type Pairs = ElasticityGroup["net"][number];

function namesOf(pairs: Pairs, of: "substitutes" | "complements", goods: readonly string[]): string {
  return listed(goods.filter((_, j) => pairs[j] === of)) || "none beyond doubt";
}

/** "normal", "not normal", "income-neutral"; and the Giffen good, where there is one. */
function respondsToIncome({ normal, incomeNeutral, giffen }: ElasticityGroup["classes"][number]): string {
  const words = incomeNeutral ? "undecided, 0 is covered" : normal === "yes" ? "rises" : "falls";
  return giffen === "yes" ? `${words}; a Giffen good` : words;
}

/** What each good of a group is, in words: by its expenditure elasticity, and with whom it stands how. */
export function ClassesView({ group }: { group: ElasticityGroup }) {
  const goods = group.classes.map(({ good }) => good);
  return (
    <section aria-labelledby="classes" className="space-y-2 border-line border-t pt-4">
      <h2 id="classes" className="type-section">
        Goods in words
      </h2>
      <Table
        caption="Classes of goods and of pairs"
        heads={[
          { key: "good", content: "Good" },
          { key: "class", content: "Is", align: "left" },
          { key: "income", content: "With expenditure it", align: "left" },
          { key: "substitutes", content: "Net substitutes", align: "left" },
          { key: "complements", content: "Net complements", align: "left" },
        ]}
        lines={group.classes.map((one, i) => ({
          key: one.good,
          head: capital(one.good),
          cells: [
            <ClassWord key="class" kind={one.kind} />,
            respondsToIncome(one),
            namesOf(group.net[i], "substitutes", goods),
            namesOf(group.net[i], "complements", goods),
          ],
        }))}
      />
    </section>
  );
}
