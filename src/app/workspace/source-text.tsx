import { lazy, Suspense, useMemo } from "react";
import type { Upload } from "../../../shared/schemas/resources.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import type { StudyConnection } from "../../sync/index.ts";
import { afterFirstFinding } from "./first-finding.ts";
import type { Standing } from "./standing.ts";

const SourceEditor = lazy(() => afterFirstFinding(() => import("../../features/editor/source-editor.tsx")));

interface SourceTextProps {
  readonly connection: StudyConnection;
  readonly standing: Standing;
  readonly cells: readonly CellSource[];
  readonly uploads: readonly Upload[];
  readonly readOnly: boolean;
  readonly onLeave: () => void;
  /** The type it is written in: prose as it is read, everything else letter for letter. */
  readonly face?: "source" | "prose";
}

/** A cell's source as text. Until the editor is here, the text stands in its place in the same type. */
export function SourceText({
  connection,
  standing,
  cells,
  uploads,
  readOnly,
  onLeave,
  face = "source",
}: SourceTextProps) {
  const { cell, kind, problems, state, last } = standing;
  const text = connection.sourceOf(cell.id);
  const lastSource = state === "current" || !last ? undefined : last.source;
  const names = cells.map((one) => one.name).join("\n");
  const subject = useMemo(
    () => ({
      kind,
      name: cell.name,
      names: names.split("\n"),
      cellsNow: () => connection.snapshot().cells,
      uploads,
      problems,
      ...(lastSource !== undefined && { lastSource }),
    }),
    [kind, cell.name, names, connection, uploads, problems, lastSource],
  );
  const steps = useMemo(
    () => ({
      manager: connection.undo,
      undo: () => connection.undoStep(cell.id),
      redo: () => connection.redoStep(cell.id),
    }),
    [connection, cell.id],
  );
  if (!text) return null;
  return (
    <Suspense
      fallback={
        <pre className={`${face === "prose" ? "type-prose" : "type-source"} whitespace-pre-wrap`}>
          {cell.source || " "}
        </pre>
      }
    >
      <SourceEditor
        // Another face is another editor: of a text there is never more than one on the page.
        key={face}
        face={face}
        text={text}
        awareness={connection.awareness}
        steps={steps}
        label={`Source of ${cell.name}`}
        readOnly={readOnly}
        subject={subject}
        onLeave={onLeave}
      />
    </Suspense>
  );
}
