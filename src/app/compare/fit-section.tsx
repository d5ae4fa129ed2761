import type { EstimatedSystem } from "../../../shared/study/nesting.ts";
import { comparedFit } from "../../../shared/tables/compared-fit.ts";
import type { TableCell } from "../../../shared/tables/table.ts";
import { CopyTable } from "../../cells/copy-table.tsx";
import { BesideLines, BesideSection, BesideWide } from "./beside.tsx";
import { likelihoodWords } from "./likelihood-words.ts";

function shown(cell: TableCell) {
  if (cell.kind === "empty") return <i className="text-ink2">not stated</i>;
  return <span className="tabular-nums">{cell.kind === "text" ? cell.text : cell.printed}</span>;
}

/** How well each fits, and whether the one is a restriction of the other that can be tested. */
export function FitSection({ left, right }: { left: EstimatedSystem; right: EstimatedSystem }) {
  const names = [left.name, right.name] as const;
  const ratio = likelihoodWords(left, right);
  const table = comparedFit(left.finding, right.finding, names, [ratio]);
  return (
    <BesideSection title="Fit" said={<CopyTable table={table} />}>
      <BesideLines
        names={names}
        lines={table.rows.map(({ label, cells: [ours, theirs] }) => ({
          key: label,
          head: label,
          left: shown(ours),
          right: shown(theirs),
        }))}
      />
      <BesideWide>
        <p className="type-finding max-w-[62ch] text-pretty">{ratio}</p>
      </BesideWide>
    </BesideSection>
  );
}
