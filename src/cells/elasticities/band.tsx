import { useState } from "react";
import { unconditionalOf } from "../../../shared/tables/conditional.ts";
import type { ByGood } from "../../../shared/tables/elasticities.ts";
import { elasticitiesSentence } from "../../../shared/tables/elasticity-words.ts";
import { isTwoStage } from "../../../shared/tables/two-stage.ts";
import { verdictsOf } from "../../../shared/tables/verdicts.ts";
import { VerdictStrip } from "../../components/verdict-strip.tsx";
import { Headline } from "../headline.tsx";
import type { BandProps } from "../types.ts";
import { stripOf } from "../verdicts.ts";
import { GoodsView } from "./goods-view.tsx";
import { ByGoodSwitch, GroupsView } from "./groups-view.tsx";
import { ElasticityNotes } from "./notes.tsx";
import { StagesView } from "./stages-view.tsx";

const LABEL = "What theory says of the system";

/** Elasticities in their band: sentence, verdicts, one table, conventions. */
export function ElasticitiesBand({ finding }: BandProps<"elasticities">) {
  const [which, setWhich] = useState<ByGood>("expenditure");
  const [first] = finding.groups;
  return (
    <div className="space-y-3">
      <Headline sentence={elasticitiesSentence(finding)} />
      <VerdictStrip label={LABEL} verdicts={stripOf(verdictsOf(finding.checks, finding.tests))} />
      {isTwoStage(finding) ? (
        <StagesView finding={finding} below="errors" />
      ) : finding.groups.length === 1 ? (
        <GoodsView finding={finding} group={first} below="errors" />
      ) : (
        <div>
          <div className="mb-1 flex justify-end">
            <ByGoodSwitch which={which} onChange={setWhich} />
          </div>
          <GroupsView finding={finding} which={which} below="errors" />
        </div>
      )}
      <ElasticityNotes finding={unconditionalOf(finding) ?? finding} />
    </div>
  );
}
