import { priceChangeTables } from "../../../shared/tables/price-change.ts";
import { priceChangeSentence } from "../../../shared/tables/price-change-words.ts";
import { verdictsOf } from "../../../shared/tables/verdicts.ts";
import { VerdictStrip } from "../../components/verdict-strip.tsx";
import { CopyTable } from "../copy-table.tsx";
import { OpenHead } from "../headline.tsx";
import type { OpenProps } from "../types.ts";
import { stripOf } from "../verdicts.ts";
import { FindingTable } from "./finding-table.tsx";
import { PriceChangeNotes } from "./notes.tsx";

const LABEL = "What theory says at the new prices";

/** A price change in full: every table of the finding, each to copy. */
export function PriceChangeOpen({ finding }: OpenProps<"price change">) {
  const [first, ...rest] = priceChangeTables(finding);
  return (
    <div className="space-y-6">
      <OpenHead sentence={priceChangeSentence(finding)}>
        <CopyTable table={first} />
      </OpenHead>
      <VerdictStrip label={LABEL} verdicts={stripOf(verdictsOf(finding.checks, finding.tests, { detail: true }))} />
      <FindingTable table={first} />
      {rest.map((table) => (
        <section key={table.name} aria-label={table.title} className="space-y-2">
          <h2 className="type-section">{table.title}</h2>
          <FindingTable table={table} />
          <CopyTable table={table} />
        </section>
      ))}
      <PriceChangeNotes finding={finding} />
    </div>
  );
}
