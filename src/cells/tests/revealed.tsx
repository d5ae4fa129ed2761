import { useId } from "react";
import type { TestsFinding } from "../../../shared/schemas/tests.ts";
import { printCount } from "../../../shared/tables/numbers.ts";
import { printIndex, revealedOf, revealedTable } from "../../../shared/tables/revealed-preference.ts";
import { AnchorMark } from "../../components/anchor-mark.tsx";
import { Table } from "../../components/table.tsx";
import { CopyTable } from "../copy-table.tsx";

/** A line that can be spoken of by its head. */
const lineOf = (head: string, value: string) => ({
  key: head,
  head: (
    <>
      {head}
      <AnchorMark of={`row ${head}`} />
    </>
  ),
  cells: [value],
});

/** Violations of the generalised axiom and the efficiency index, with what they take for granted. */
export function RevealedTable({ finding }: { finding: TestsFinding }) {
  const revealed = revealedOf(finding);
  if (!revealed) return null;
  const table = revealedTable(revealed);
  return (
    <>
      <Table
        caption={table.title}
        className="max-w-[27rem]"
        heads={[
          { key: "axiom", content: table.corner },
          { key: "value", content: "" },
        ]}
        lines={[
          lineOf("Rows compared", printCount(revealed.rows)),
          lineOf("Rows that contradict another", printCount(revealed.rowsInvolved)),
          lineOf("Ordered pairs of them", printCount(revealed.pairs)),
          lineOf("of these, without a third row", printCount(revealed.directPairs)),
          lineOf("Afriat’s efficiency index", printIndex(revealed.index)),
        ]}
      />
      <p className="type-small mt-2 max-w-[62ch] text-pretty text-ink2">{table.notes.join(" ")}</p>
    </>
  );
}

/** The same as a section of an opened cell, or why there is none. */
export function Revealed({ finding }: { finding: TestsFinding }) {
  const id = useId();
  if (!finding.revealed) return null;
  const revealed = revealedOf(finding);
  return (
    <section aria-labelledby={id} className="border-line border-t pt-4">
      <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-6">
        <h2 id={id} className="type-section">
          Revealed preference
        </h2>
        {revealed && <CopyTable table={revealedTable(revealed)} />}
      </div>
      {"absent" in finding.revealed ? (
        <p className="type-small max-w-[62ch] text-ink2">{finding.revealed.absent}</p>
      ) : (
        <RevealedTable finding={finding} />
      )}
    </section>
  );
}
