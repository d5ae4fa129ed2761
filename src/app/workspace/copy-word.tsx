import { Word } from "../../components/button.tsx";
import { useCopying } from "../../components/use-copying.ts";

interface CopyWordProps {
  /** What is copied, as it is called: table, text. */
  readonly what: string;
  /** The cell's name. */
  readonly name: string;
  readonly write: () => Promise<void>;
}

/** *Copy table*, *Copy text*: the finding of a cell, for a spreadsheet or a manuscript. */
export function CopyWord({ what, name, write }: CopyWordProps) {
  const { said, copy } = useCopying();
  return (
    <span>
      <span role="status" className={said ? "mr-3 text-ink2" : ""}>
        {said}
      </span>
      <Word onClick={() => void copy(write)}>
        Copy {what} <span className="sr-only">of {name}</span>
      </Word>
    </span>
  );
}
