import "../../styles/prose.css";
import type { SealedText as Sealed } from "../../../shared/schemas/text.ts";
import { counted } from "../../../shared/study/words.ts";
import { askedInWords, asSealed } from "../../../shared/tables/text-finding.ts";
import { Table, type TableHead } from "../../components/table.tsx";
import { ReadText } from "./read-text.tsx";

const HEADS: readonly TableHead[] = [
  { key: "asked", content: "Quoted as", align: "left" },
  { key: "number", content: "Number" },
  { key: "says", content: "What it is", align: "left" },
  { key: "fingerprint", content: "Fingerprint", align: "left" },
];

/** A sealed text: as it read then, with every number it quotes, which no later finding changes. */
export function SealedText({ finding }: { finding: Sealed }) {
  const { numbers } = finding;
  return (
    <>
      <ReadText finding={asSealed(finding)} />
      {numbers.length > 0 && (
        <>
          <p className="sealed-numbers type-small mt-4 mb-3 text-ink2">
            {counted(numbers.length, "quoted number")}, as {numbers.length === 1 ? "it was" : "they were"} when this was
            sealed.
          </p>
          <Table
            caption="Quoted numbers, as sealed"
            heads={HEADS}
            lines={numbers.map((one) => ({
              key: String(one.from),
              head: <span className="type-source">{askedInWords(one)}</span>,
              cells: [
                one.printed,
                one.says,
                <span key="fingerprint" className="type-source whitespace-nowrap text-[0.78125rem]">
                  {(one.fingerprint?.slice(0, 16).match(/.{4}/g) ?? []).join(" ")}
                </span>,
              ],
            }))}
          />
        </>
      )}
    </>
  );
}
