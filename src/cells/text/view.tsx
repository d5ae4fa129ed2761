import type { QuotedNumber } from "../../../shared/schemas/text.ts";
import { askedInWords, quotedNumbersTable } from "../../../shared/tables/text-finding.ts";
import { StateShape } from "../../components/state-shape.tsx";
import { Table, type TableHead } from "../../components/table.tsx";
import { CopyTable } from "../copy-table.tsx";
import type { OpenProps } from "../types.ts";
import { TextBand } from "./band.tsx";

const HEADS: readonly TableHead[] = [
  { key: "asked", content: "Quoted as", align: "left" },
  { key: "number", content: "Number" },
  { key: "says", content: "What it is", align: "left" },
  { key: "standing", content: "Its finding", align: "left" },
  { key: "fingerprint", content: "Fingerprint", align: "left" },
];

/** A text in full: as it reads, then every number it quotes with what that is and where it is from. */
export function TextOpen({ finding }: OpenProps<"text">) {
  const { quotations } = finding;
  return (
    <>
      <TextBand finding={finding} />
      {quotations.length > 0 && (
        <section className="mt-10">
          <div className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1 pb-3">
            <h3 className="type-section">Quoted numbers</h3>
            <CopyTable table={quotedNumbersTable(finding)} />
          </div>
          <Table
            caption="Quoted numbers"
            heads={HEADS}
            lines={quotations.map((one) => ({
              key: String(one.from),
              head: <span className="type-source">{askedInWords(one)}</span>,
              cells: cellsOf(one),
            }))}
          />
        </section>
      )}
    </>
  );
}

function cellsOf({ standing, printed, says, fingerprint, because }: QuotedNumber) {
  const state = standing === "absent" ? "failed" : standing;
  return [
    printed ?? "none",
    says ?? because,
    <span key="standing" className="inline-flex items-baseline gap-2">
      <StateShape state={state} />
      {standing === "absent" ? "no number" : standing}
    </span>,
    <span key="fingerprint" className="type-source whitespace-nowrap text-[0.78125rem]">
      {(fingerprint?.slice(0, 16).match(/.{4}/g) ?? []).join(" ")}
    </span>,
  ];
}
