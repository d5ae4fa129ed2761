import { priceChangeTables } from "../../../shared/tables/price-change.ts";
import { priceChangeSentence } from "../../../shared/tables/price-change-words.ts";
import { verdictsOf } from "../../../shared/tables/verdicts.ts";
import { VerdictStrip } from "../../components/verdict-strip.tsx";
import { Headline } from "../headline.tsx";
import type { BandProps } from "../types.ts";
import { stripOf } from "../verdicts.ts";
import { ReadWithCare } from "./care.tsx";
import { FindingTable } from "./finding-table.tsx";
import { PriceChangeNotes } from "./notes.tsx";

const LABEL = "What theory says at the new prices";

/** A price change in its band: sentence, verdicts at the new prices, one table, cautions. */
export function PriceChangeBand({ finding }: BandProps<"price change">) {
  const [first] = priceChangeTables(finding);
  return (
    <div className="space-y-3">
      <Headline sentence={priceChangeSentence(finding)} />
      <ReadWithCare finding={finding} />
      <VerdictStrip label={LABEL} verdicts={stripOf(verdictsOf(finding.checks, finding.tests))} />
      <FindingTable table={first} />
      <PriceChangeNotes finding={finding} />
    </div>
  );
}
