import { systemSentence } from "../../../shared/tables/sentence.ts";
import { systemVerdicts } from "../../../shared/tables/verdicts.ts";
import { VerdictStrip } from "../../components/verdict-strip.tsx";
import { Headline } from "../headline.tsx";
import type { BandProps } from "../types.ts";
import { stripOf } from "../verdicts.ts";
import { CoefficientView } from "./coefficient-view.tsx";
import { SystemNote } from "./note.tsx";

/** A fitted system in its band: sentence, verdicts, coefficients with their Engel curves, note. */
export function SystemBand({ finding }: BandProps<"system">) {
  return (
    <div className="space-y-3">
      <Headline sentence={systemSentence(finding)} />
      <VerdictStrip label="What theory says of the system" verdicts={stripOf(systemVerdicts(finding))} />
      <CoefficientView finding={finding} />
      <SystemNote finding={finding} />
    </div>
  );
}
