import { useId, useState } from "react";
import type { ElasticitiesFinding } from "../../../shared/schemas/elasticities.ts";
import { conditionalWords, isUnconditional, unconditionalOf } from "../../../shared/tables/conditional.ts";
import { type ByGood, goodsTable, groupsTable } from "../../../shared/tables/elasticities.ts";
import { elasticitiesSentence, whereOf } from "../../../shared/tables/elasticity-words.ts";
import { capital } from "../../../shared/tables/phrases.ts";
import { isTwoStage, stagesTable } from "../../../shared/tables/two-stage.ts";
import { verdictsOf } from "../../../shared/tables/verdicts.ts";
import { VerdictStrip } from "../../components/verdict-strip.tsx";
import { CopyTable } from "../copy-table.tsx";
import { OpenHead } from "../headline.tsx";
import type { OpenProps } from "../types.ts";
import { stripOf } from "../verdicts.ts";
import { BroaderView } from "./broader-view.tsx";
import { ClassesView } from "./classes-view.tsx";
import { GoodsView } from "./goods-view.tsx";
import { ByGoodSwitch, GroupsView } from "./groups-view.tsx";
import { IntervalFigure } from "./interval-figure.tsx";
import { ElasticityNotes } from "./notes.tsx";
import { type Below, BelowSwitch } from "./one-estimate.tsx";
import { PricesView } from "./prices-view.tsx";
import { type StageShown, StageSwitch } from "./stage-switch.tsx";
import { StagesView } from "./stages-view.tsx";

const LABEL = "What theory says of the system";

/** Elasticities in full: groups compared, then one group's goods, price elasticities and classes. */
export function ElasticitiesOpen({ finding: told }: OpenProps<"elasticities">) {
  const id = useId();
  const [which, setWhich] = useState<ByGood>("expenditure");
  const [below, setBelow] = useState<Below>("errors");
  const [wanted, setWanted] = useState(0);
  const [stage, setStage] = useState<StageShown>("unconditional");
  const whole = stage === "unconditional" ? unconditionalOf(told) : undefined;
  const finding = whole ?? told;
  const several = finding.groups.length > 1;
  const chosen = Math.min(wanted, finding.groups.length - 1);
  const group = finding.groups[chosen];
  const figure = (
    <div>
      {!several && (
        <div className="mb-2">
          <ByGoodSwitch which={which} onChange={setWhich} />
        </div>
      )}
      <IntervalFigure finding={finding} which={which} chosen={chosen} />
    </div>
  );
  return (
    <div className="space-y-6">
      <OpenHead sentence={elasticitiesSentence(told)}>
        <CopyTable
          table={
            isTwoStage(told) ? stagesTable(told) : several ? groupsTable(finding, which) : goodsTable(finding, group)
          }
        />
      </OpenHead>
      <VerdictStrip label={LABEL} verdicts={stripOf(verdictsOf(finding.checks, finding.tests, { detail: true }))} />
      <div className="flex flex-wrap items-baseline gap-x-8 gap-y-1 min-[600px]:*:last:ml-auto">
        {several && <ByGoodSwitch which={which} onChange={setWhich} />}
        <BelowSwitch below={below} onChange={setBelow} />
      </div>
      {isTwoStage(told) && (
        <>
          <StagesView finding={told} below={below} />
          <div className="border-line border-t pt-4">
            <StageSwitch stage={stage} onChange={setStage} />
          </div>
        </>
      )}
      {several && (
        <>
          <GroupsView finding={finding} which={which} below={below} chosen={chosen} onChoose={setWanted} />
          {figure}
        </>
      )}
      <section aria-labelledby={id} className="space-y-2" aria-live="polite">
        <h2 id={id} className="type-section">
          {headOf(finding, group.name)}
        </h2>
        <GoodsView finding={finding} group={group} below={below} />
        {(several || isTwoStage(told)) && <CopyTable table={goodsTable(finding, group)} />}
      </section>
      {!several && figure}
      <PricesView finding={finding} group={group} below={below} />
      <ClassesView finding={finding} group={group} />
      {isTwoStage(told) && <BroaderView finding={told} below={below} />}
      <ElasticityNotes finding={finding} />
    </div>
  );
}

/** "At the sample mean", "Unconditional, at the sample mean", "Conditional on food expenditure, at the sample mean". */
function headOf(finding: ElasticitiesFinding, name: string): string {
  const stage = isUnconditional(finding) ? "unconditional" : conditionalWords(finding);
  const where = whereOf(finding, name);
  return capital(stage ? `${stage}, ${where}` : where);
}
