import { useEffect, useRef } from "react";
import type { Awareness } from "y-protocols/awareness";
import type * as Y from "yjs";
import { Word } from "../../components/button.tsx";
import { createEditor, type Editor, type EditorSteps } from "./create-editor.ts";
import type { EditorSubject } from "./editor-subject.ts";

interface SourceEditorProps {
  readonly text: Y.Text;
  readonly awareness: Awareness;
  readonly steps?: EditorSteps;
  readonly label: string;
  readonly readOnly: boolean;
  /** Of prose: whether it is written in the type it is read in. */
  readonly face: "source" | "prose";
  readonly subject: EditorSubject;
  readonly onLeave: () => void;
}

/** A cell's source, edited live with everyone who has it open. */
export default function SourceEditor(props: SourceEditorProps) {
  const { text, awareness, steps, label, readOnly, face, subject, onLeave } = props;
  const parent = useRef<HTMLDivElement>(null);
  const editor = useRef<Editor>(undefined);
  const latest = useRef({ subject, onLeave });
  latest.current = { subject, onLeave };
  useEffect(() => {
    if (!parent.current) return;
    const made = createEditor({
      parent: parent.current,
      text,
      awareness,
      steps,
      label,
      readOnly,
      face,
      subject: latest.current.subject,
      onLeave: () => latest.current.onLeave(),
    });
    editor.current = made;
    return () => {
      editor.current = undefined;
      made.destroy();
    };
  }, [text, awareness, steps, label, readOnly, face]);
  useEffect(() => editor.current?.setSubject(subject), [subject]);
  return (
    <>
      <div ref={parent} className="source-editor" />
      {subject.kind === "text" && !readOnly && (
        <p className="type-smallest mt-3 flex flex-wrap items-baseline gap-x-4 gap-y-1 text-ink2">
          <Word className="type-small" onClick={() => editor.current?.quote()}>
            Quote a number
          </Word>
          <span>Markdown; mathematics between $ signs; a brace quotes a number.</span>
        </p>
      )}
    </>
  );
}
