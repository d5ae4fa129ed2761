import { useState } from "react";
import type { LabelledTable } from "../../../shared/tables/table.ts";
import { Word } from "../../components/button.tsx";

/** *Copy table*: pastes into a spreadsheet; LaTeX and CSV are in the opened cell. */
export function CopyWord({ table, name }: { table: LabelledTable; name: string }) {
  const [said, setSaid] = useState<string>();
  const copy = async () => {
    try {
      const { copyTable } = await import("../../cells/copy-table.tsx");
      await copyTable(table, "table");
      setSaid("Copied");
    } catch {
      setSaid("The browser does not let this page copy");
    }
  };
  return (
    <span>
      <span role="status" className={said ? "mr-3 text-ink2" : ""}>
        {said}
      </span>
      <Word onClick={() => void copy()}>
        Copy table <span className="sr-only">of {name}</span>
      </Word>
    </span>
  );
}
