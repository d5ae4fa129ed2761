import { useId, useState } from "react";
import { type EffectName, effectsTable, incidenceTable, welfareTable } from "../../../shared/tables/price-change.ts";
import { priceChangeSentence } from "../../../shared/tables/price-change-words.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { verdictsOf } from "../../../shared/tables/verdicts.ts";
import { VerdictStrip } from "../../components/verdict-strip.tsx";
import { CopyTable } from "../copy-table.tsx";
import { OpenHead } from "../headline.tsx";
import type { OpenProps } from "../types.ts";
import { stripOf } from "../verdicts.ts";
import { ReadWithCare } from "./care.tsx";
import { PriceRulers } from "./controls.tsx";
import { EffectSwitch, EffectsView } from "./effects-view.tsx";
import { FindingTable } from "./finding-table.tsx";
import { IncidenceView, incidenceSays } from "./incidence-view.tsx";
import { NamedRows } from "./named-rows.tsx";
import { PriceChangeNotes } from "./notes.tsx";
import { PictureSection } from "./picture-section.tsx";
import { PricesView } from "./prices-view.tsx";
import { TrialStanding } from "./standing.tsx";
import { useTrial } from "./trial.ts";

const LABEL = "What theory says at the new prices";

/** A price change in full: what is stored, or what the rulers try, in the same tables and the same picture. */
export function PriceChangeOpen({ finding, form }: OpenProps<"price change">) {
  const trial = useTrial(finding);
  const { shown } = trial;
  const { at } = shown;
  const [wanted, setWanted] = useState<EffectName>("hicks");
  const which = at[wanted] ? wanted : at.slutsky ? "slutsky" : "infinitesimal";
  const id = useId();
  const verdicts = verdictsOf(shown.checks, shown.tests, { detail: true });
  return (
    <div className="space-y-6">
      {/* Within a study the rulers stand on the source page; elsewhere there is none. */}
      {!form && <PriceRulers finding={finding} />}
      <TrialStanding {...trial} />
      <OpenHead sentence={priceChangeSentence(shown)}>
        <CopyTable table={effectsTable(shown, which)} />
      </OpenHead>
      <ReadWithCare finding={shown} />
      <VerdictStrip label={LABEL} verdicts={stripOf(verdicts)} />
      <div className="grid gap-x-10 gap-y-6 min-[1280px]:grid-cols-[minmax(0,11fr)_minmax(0,10fr)]">
        <section aria-labelledby={`${id}-effects`} className="min-w-0">
          <div className="flex flex-wrap items-baseline justify-between gap-x-6">
            <h2 id={`${id}-effects`} className="type-section">
              What is bought at {withArticle(shown.pointName)}
            </h2>
            <EffectSwitch finding={shown} which={which} onChange={setWanted} />
          </div>
          <EffectsView finding={shown} which={which} />
        </section>
        <PictureSection finding={shown} by={which === "slutsky" ? "slutsky" : "hicks"} />
      </div>
      <div className="grid gap-x-10 gap-y-6 min-[1280px]:grid-cols-[minmax(0,11fr)_minmax(0,10fr)]">
        <section aria-labelledby={`${id}-cost`} className="min-w-0 space-y-2">
          <h2 id={`${id}-cost`} className="type-section">
            What it costs at {withArticle(shown.pointName)}
          </h2>
          <FindingTable table={welfareTable(shown)} />
          <CopyTable table={welfareTable(shown)} />
        </section>
        <section aria-labelledby={`${id}-prices`} className="min-w-0 space-y-2">
          <h2 id={`${id}-prices`} className="type-section">
            Prices and shares
          </h2>
          <PricesView finding={shown} />
        </section>
      </div>
      {shown.incidence && (
        <section aria-labelledby={`${id}-incidence`} className="space-y-2 border-line border-t pt-4">
          <h2 id={`${id}-incidence`} className="type-section">
            Who bears it
          </h2>
          <p className="type-small text-ink2">{incidenceSays(shown.incidence)}</p>
          <IncidenceView incidence={shown.incidence} />
          <CopyTable table={incidenceTable(shown)} />
          <NamedRows incidence={shown.incidence} />
        </section>
      )}
      {trial.isTried && finding.incidence && (
        <p className="type-small border-line border-t pt-4 text-ink2">
          Who bears it is counted over all rows by the server once a price change is kept.
        </p>
      )}
      <PriceChangeNotes finding={shown} />
    </div>
  );
}
