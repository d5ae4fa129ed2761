import { coefficientTable } from "../../../shared/tables/coefficients.ts";
import { systemSentence } from "../../../shared/tables/sentence.ts";
import { systemVerdicts } from "../../../shared/tables/verdicts.ts";
import { VerdictStrip } from "../../components/verdict-strip.tsx";
import { CopyTable } from "../copy-table.tsx";
import { OpenHead } from "../headline.tsx";
import type { OpenProps } from "../types.ts";
import { stripOf } from "../verdicts.ts";
import { CoefficientView } from "./coefficient-view.tsx";
import { EndogeneityView } from "./endogeneity-view.tsx";
import { EngelView } from "./engel-view.tsx";
import { FitView } from "./fit-view.tsx";
import { SystemNote } from "./note.tsx";
import { TestsView } from "./tests-view.tsx";
import { ZerosView } from "./zeros-view.tsx";

/** A fitted system in full: the same, with the tests of the theory and the fit. */
export function SystemOpen({ finding }: OpenProps<"system">) {
  return (
    <div className="space-y-6">
      <OpenHead sentence={systemSentence(finding)}>
        <CopyTable table={coefficientTable(finding)} />
      </OpenHead>
      <VerdictStrip label="What theory says of the system" verdicts={stripOf(systemVerdicts(finding))} />
      <div>
        <CoefficientView finding={finding} />
        <SystemNote finding={finding} />
      </div>
      {finding.engel.logTotal.length > 0 && <EngelView finding={finding} />}
      <TestsView tests={finding.tests} untested={finding.untested} standardErrors={finding.standardErrors} />
      {finding.endogeneity && <EndogeneityView endogeneity={finding.endogeneity} />}
      {finding.zeros && <ZerosView zeros={finding.zeros} />}
      <FitView finding={finding} />
    </div>
  );
}
