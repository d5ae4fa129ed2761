import { useId, useState } from "react";
import type { Remark } from "../../../shared/schemas/remarks.ts";
import { counted } from "../../../shared/study/words.ts";
import { Word } from "../../components/button.tsx";
import { RemarkEntry } from "./remark-entry.tsx";
import type { RemarkSetting } from "./remark-setting.ts";

/** Settled remarks, folded into a line that says how many. */
export function SettledRemarks({ setting, remarks }: { setting: RemarkSetting; remarks: readonly Remark[] }) {
  const id = useId();
  const [isOpen, setOpen] = useState(false);
  if (remarks.length === 0) return null;
  return (
    <div className="remarks-settled">
      <Word
        quiet
        className="type-small"
        aria-expanded={isOpen}
        aria-controls={isOpen ? id : undefined}
        onClick={() => setOpen(!isOpen)}
      >
        {counted(remarks.length, "settled remark")}
      </Word>
      {isOpen && (
        <ol id={id}>
          {remarks.map((remark) => (
            <RemarkEntry key={remark.id} setting={setting} remark={remark} />
          ))}
        </ol>
      )}
    </div>
  );
}
