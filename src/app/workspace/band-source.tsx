import { lazy, Suspense } from "react";
import { useNavigate } from "react-router-dom";
import type { Upload } from "../../../shared/schemas/resources.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { SwitchWords } from "../../components/switch-words.tsx";
import { pages } from "../../lib/paths.ts";
import type { StudyConnection } from "../../sync/index.ts";
import { type CellActions, CellMenu } from "./cell-menu.tsx";
import { CellName } from "./cell-name.tsx";
import { CellForm } from "./finding-view.tsx";
import { afterFirstFinding } from "./first-finding.ts";
import { renameGoodEverywhere } from "./rename-good-everywhere.ts";
import { SourceFoot } from "./source-foot.tsx";
import { SourceText } from "./source-text.tsx";
import type { Standing } from "./standing.ts";

const FirstUpload = lazy(() => import("./first-upload.tsx"));
const PaperWords = lazy(() => afterFirstFinding(() => import("./paper-words.tsx")));
const SourceLine = lazy(() => afterFirstFinding(() => import("./source-line.tsx")));

/** Which page of the source is open; a strip shows neither until asked. */
export type SourcePage = "form" | "text" | "closed";

export interface BandSourceProps {
  readonly studyId: string;
  readonly connection: StudyConnection;
  readonly standing: Standing;
  readonly cells: readonly CellSource[];
  readonly uploads: readonly Upload[];
  readonly readOnly: boolean;
  readonly page: SourcePage;
  readonly onPage: (page: SourcePage) => void;
  readonly headingId: string;
  readonly renaming: boolean;
  readonly actions: CellActions;
  readonly onRename: (name: string) => void;
  readonly onRenamed: () => void;
  readonly onLeave: () => void;
  readonly typing?: React.ReactNode;
  /** Stands between the name and the source. */
  readonly above?: React.ReactNode;
  readonly title?: boolean;
}

const WORDS = [
  { value: "form", word: "Form" },
  { value: "text", word: "Text" },
] as const;

/** Prose has no form: it is written in the type it is read in, or letter for letter. */
const PROSE_WORDS = [{ value: "form", word: "Written" }, WORDS[1]] as const;

/** The left page of a band: name, kind and source, as a form or as text. */
export function BandSource(props: BandSourceProps) {
  const { standing, cells, page, onPage, headingId, readOnly, typing, title } = props;
  const { cell } = standing;
  const navigate = useNavigate();
  const history = () => void navigate(`${pages.history(props.studyId)}?cell=${encodeURIComponent(cell.id)}`);
  const idOf = (name: string) => cells.find((one) => one.name === name)?.id;
  return (
    <>
      <div className="flex flex-wrap items-start justify-between gap-x-4 gap-y-1 pb-3">
        <CellName
          cell={cell}
          cells={cells}
          headingId={headingId}
          renaming={props.renaming}
          onRename={props.onRename}
          onDone={props.onRenamed}
          title={title}
          isDraggable={!readOnly && !title}
        />
        <div className="no-print flex gap-3.5 pt-1">
          <SwitchWords
            label={`Source of ${cell.name} as`}
            words={standing.kind === "text" ? PROSE_WORDS : WORDS}
            value={page === "closed" ? undefined : page}
            onChange={(next) => onPage(next)}
          />
          <CellMenu name={cell.name} actions={{ ...props.actions, ...(!readOnly && { history }) }} />
        </div>
      </div>
      {props.above}
      {title && <h2 className="sr-only">Source</h2>}
      <div className="no-print">
        {page === "closed" ? (
          <p className="type-source truncate text-ink2">
            <Suspense fallback={cell.source.split("\n", 1)[0] || " "}>
              <SourceLine cell={cell} />
            </Suspense>
          </p>
        ) : (
          <Source {...props} />
        )}
      </div>
      {/* A text that reads stands on the right page with its numbers, and once is enough. */}
      {!(standing.kind === "text" && standing.problems.length === 0) && (
        <pre className="print-only type-source whitespace-pre-wrap">{cell.source}</pre>
      )}
      {typing}
      {page !== "closed" && standing.kind === "system" && !standing.isUnread && (
        <Suspense>
          <PaperWords studyId={props.studyId} standing={standing} cells={cells} uploads={props.uploads} />
        </Suspense>
      )}
      {page !== "closed" && <SourceFoot standing={standing} idOf={idOf} />}
    </>
  );
}

function Source({ studyId, connection, standing, cells, uploads, readOnly, page, onLeave }: BandSourceProps) {
  const { cell, kind } = standing;
  const onChange = (next: string) => connection.replaceSource(cell.id, next);
  if (page === "text" || kind === "text" || !kind) {
    return (
      <SourceText
        face={page === "form" ? "prose" : "source"}
        connection={connection}
        standing={standing}
        cells={cells}
        uploads={uploads}
        readOnly={readOnly}
        onLeave={onLeave}
      />
    );
  }
  if (standing.waitsForFile && !readOnly) {
    return (
      <Suspense>
        <FirstUpload studyId={studyId} uploads={uploads} onChange={onChange} />
      </Suspense>
    );
  }
  return (
    <CellForm
      kind={kind}
      source={cell.source}
      onChange={onChange}
      onRenameGood={(good, name) => void renameGoodEverywhere(connection, cell.id, good, name)}
      readOnly={readOnly}
      context={{ cells, uploads }}
    />
  );
}
