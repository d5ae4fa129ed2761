import { useState } from "react";
import type { Elasticities } from "../../../shared/economics/elasticities.ts";
import type { EstimatedSystem } from "../../../shared/study/nesting.ts";
import {
  comparedElasticities,
  comparedTable,
  largestDifference,
  OWN_ELASTICITIES,
} from "../../../shared/tables/compared.ts";
import { conditionalWords } from "../../../shared/tables/conditional.ts";
import { DECIMALS } from "../../../shared/tables/numbers.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { CopyTable } from "../../cells/copy-table.tsx";
import { SwitchWords } from "../../components/switch-words.tsx";
import { BesideSection, BesideWide } from "./beside.tsx";
import { ComparedFigure } from "./compared-figure.tsx";
import { ComparedView } from "./compared-view.tsx";
import { useElasticities } from "./use-elasticities.ts";

type Own = (typeof OWN_ELASTICITIES)[number];

const BOUNDS: Readonly<Record<Own, { at: number; below: string; above: string }>> = {
  Expenditure: { at: 1, below: "necessities", above: "luxuries" },
  "Own price": { at: -1, below: "elastic", above: "inelastic" },
  "Own price, compensated": { at: -1, below: "elastic", above: "inelastic" },
};
const WORDS = OWN_ELASTICITIES.map((value) => ({ value, word: value }));

interface Sides {
  readonly left: EstimatedSystem;
  readonly right: EstimatedSystem;
}

/** Elasticities of both, each at the point of its own checks: a sentence, a picture, the numbers. */
export function ElasticitiesSection({ left, right }: Sides) {
  const found = useElasticities(left.finding, right.finding);
  if (found.state === "done") {
    return <Found left={left} right={right} ours={found.left} theirs={found.right} />;
  }
  return (
    <BesideSection wide title="Elasticities">
      <BesideWide>
        <p role="status" className="type-small text-ink2">
          {found.state === "computing" ? "Computing the elasticities" : `They cannot be computed: ${found.reason}.`}
        </p>
      </BesideWide>
    </BesideSection>
  );
}

function Found({ left, right, ours, theirs }: Sides & { ours: Elasticities; theirs: Elasticities }) {
  const [which, setWhich] = useState<Own>("Expenditure");
  const names = [left.name, right.name] as const;
  const compared = comparedElasticities(
    { goods: left.finding.fitted.goods, ...ours },
    { goods: right.finding.fitted.goods, ...theirs },
  );
  const where = whereWords(left, right);
  const note = `${where} Estimate over (standard error), by the delta method. A compensated elasticity stands in the row of the good demanded and the column of the price.`;
  const table = comparedTable(compared, {
    name: "elasticities-compared",
    title: `Elasticities of ${left.name} and ${right.name}`,
    corner: "Elasticity",
    names,
    decimals: DECIMALS.elasticity,
    notes: [note],
  });
  const sentences = (["Expenditure", "Own price"] as const).flatMap(
    (label) => largestDifference(compared, label, names, DECIMALS.elasticity) ?? [],
  );
  const row = compared.rows.find(({ label }) => label === which);
  return (
    <BesideSection wide title="Elasticities" said={<CopyTable table={table} />}>
      <BesideWide>
        <p className="type-finding mb-3 max-w-[62ch] text-pretty">{sentences.join(" ")}</p>
        <SwitchWords label="Elasticity in the picture" words={WORDS} value={which} onChange={setWhich} />
        {row && (
          <div className="mt-3 mb-5">
            <ComparedFigure row={row} goods={compared.goods} names={names} bound={BOUNDS[which]} />
          </div>
        )}
        <ComparedView
          compared={compared}
          caption="Elasticities side by side"
          corner="Elasticity"
          names={names}
          decimals={DECIMALS.elasticity}
          folded="all compensated elasticities"
        />
        <p className="type-small mt-2 max-w-[70ch] text-pretty text-ink2">{note}</p>
      </BesideWide>
    </BesideSection>
  );
}

/** Where each is evaluated. */
function whereWords(left: EstimatedSystem, right: EstimatedSystem): string {
  const [one, other] = [left, right].map(({ finding }) => finding.checks.pointName);
  const conditional = [left, right].flatMap(({ name, finding }) => {
    const words = conditionalWords(finding);
    return words ? [`Those of ${name} are ${words}.`] : [];
  });
  const where =
    one === other
      ? `Both at ${withArticle(one)} of the data they rest on.`
      : `${left.name} at ${withArticle(one)} of its data, ${right.name} at ${withArticle(other)} of its own.`;
  return [where, ...conditional].join(" ");
}
