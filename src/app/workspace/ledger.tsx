import { Fragment, useMemo, useRef, useState } from "react";
import { useNavigate } from "react-router-dom";
import type { Upload } from "../../../shared/schemas/resources.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { Thread } from "../../components/thread.tsx";
import { type Present, presentPeople, typists } from "../../features/presence/present.ts";
import { OpenRemarks } from "../../features/remarks/open-remarks.tsx";
import { RemarkNews } from "../../features/remarks/remark-news.tsx";
import { useRemarkSetting } from "../../features/remarks/remark-setting.ts";
import { pages } from "../../lib/paths.ts";
import { useStudyPart } from "../../sync/index.ts";
import { AddCellBand } from "./add-cell-band.tsx";
import { addressOf, beginRemark, focusBand } from "./addresses.ts";
import { CellBand } from "./cell-band.tsx";
import { comparable } from "./comparable.ts";
import { HeadBand } from "./head-band.tsx";
import type { OpenStudy } from "./open-study.ts";
import { RemovedCell } from "./removed-cell.tsx";
import type { Standing } from "./standing.ts";
import { stopsOf } from "./stops.ts";
import { useBandDrag } from "./use-band-drag.ts";
import { useBandKeys } from "./use-band-keys.ts";
import { useFolded } from "./use-folded.ts";
import { usePlaces } from "./use-places.ts";
import { useRemoval } from "./use-removal.ts";
import { useSourcePages } from "./use-source-pages.ts";
import { useStudyActions } from "./use-study-actions.ts";

interface LedgerProps extends OpenStudy {
  readonly standings: readonly Standing[];
  readonly cells: readonly CellSource[];
  readonly uploads: readonly Upload[];
  readonly headAction?: React.ReactNode;
  readonly onUploads: () => void;
  readonly onRemarks: () => void;
}

const NOBODY: readonly Present[] = [];
/** Until the page has drawn what has just changed. */
const SETTLING_MS = 60;

const nameOf = (cells: readonly CellSource[], cellId: string) => cells.find(({ id }) => id === cellId)?.name ?? "";

/** The study as an open ledger: its own band, a band for each cell, the thread beside them, a last band to add. */
export function Ledger(props: LedgerProps) {
  const { study, connection, readOnly, standings, cells, uploads, headAction, onUploads, onRemarks } = props;
  const ledger = useRef<HTMLDivElement>(null);
  const [focused, setFocused] = useState<string>();
  const [renaming, setRenaming] = useState<string>();
  const source = useSourcePages();
  const actions = useStudyActions(connection, uploads);
  const { removal, ...removing } = useRemoval(connection);
  const remarking = useRemarkSetting(study.id, props.me, connection);
  const typing = useTypists(connection);
  const ids = cells.map(({ id }) => id);
  const places = usePlaces(ledger, ids);
  const folded = useFolded(study.id, ids);
  const [said, say] = useState("");
  const navigate = useNavigate();
  const focus = (cellId: string) => {
    setFocused(cellId);
    connection.goTo(cellId);
  };
  const step = (by: 1 | -1) => {
    const place = focused === undefined ? -1 : ids.indexOf(focused);
    const next = ids[Math.min(ids.length - 1, Math.max(0, place + by))];
    if (next !== undefined) focusBand(next);
  };
  const focusedCell = cells.find(({ id }) => id === focused);
  /** A band that is put elsewhere on the page loses the focus, and has it again where it comes to stand. */
  const refocus = (cellId: string) => setTimeout(focusBand, SETTLING_MS, cellId);
  const move = (cellId: string, by: 1 | -1) => {
    const place = ids.indexOf(cellId) + by;
    if (place < 0 || place >= ids.length) return;
    actions.move(cellId, by);
    say(`${nameOf(cells, cellId)} is now cell ${place + 1} of ${ids.length}.`);
    refocus(cellId);
  };
  const remove = (cell: CellSource) => {
    const place = ids.indexOf(cell.id);
    actions.remove(cell.id);
    removing.note(cell, ids[place - 1] ?? null);
    setTimeout(() => document.querySelector<HTMLElement>(".removed-cell button")?.focus(), SETTLING_MS);
  };
  const duplicate = (cell: CellSource) => void actions.duplicate(cell).then(refocus);
  const drag = useBandDrag(ids, (cellId, after) => {
    actions.moveAfter(cellId, after);
    refocus(cellId);
  });
  const onFocused = (act: (cell: CellSource) => void) => () => focusedCell && act(focusedCell);
  const onWritable = (act: (cell: CellSource) => void) => onFocused((cell) => !readOnly && act(cell));
  const compareWith = (standing: Standing) => comparable(study.id, standing, standings, (to) => void navigate(to));
  useBandKeys({
    next: () => step(1),
    previous: () => step(-1),
    open: onFocused(({ id }) => void navigate(pages.cell(study.id, id))),
    swap: onFocused((cell) => {
      folded.fold(cell.id, false);
      source.swap(cell);
    }),
    fold: onFocused(({ id }) => folded.fold(id, !folded.isFolded(id))),
    compare: onFocused(({ id }) => {
      const standing = standings.find(({ cell }) => cell.id === id);
      if (standing) compareWith(standing)?.[0]?.go();
    }),
    remark: onFocused(({ id }) => beginRemark(id)),
    rename: onWritable(({ id }) => setRenaming(id)),
    duplicate: onWritable(duplicate),
    moveUp: onWritable(({ id }) => move(id, -1)),
    moveDown: onWritable(({ id }) => move(id, 1)),
    remove: onWritable(remove),
    leave: onFocused(({ id }) => focusBand(id)),
  });
  const changesOf = ({ cell, kind }: Standing, place: number) => ({
    rename: () => setRenaming(cell.id),
    duplicate: () => duplicate(cell),
    remove: () => remove(cell),
    ...(place > 0 && { moveUp: () => move(cell.id, -1) }),
    ...(place < standings.length - 1 && { moveDown: () => move(cell.id, 1) }),
    ...(kind === "data" && { uploads: onUploads }),
  });
  const removed = removal && (
    <RemovedCell
      cell={removal.cell}
      onUndo={() => {
        removing.undo();
        refocus(removal.cell.id);
      }}
      onDismiss={() => {
        removing.dismiss();
        const near = removal.after ?? ids[0];
        if (near) refocus(near);
      }}
    />
  );
  const stops = stopsOf(standings, places.y);
  return (
    <div className="desk">
      <RemarkNews studyId={study.id} me={props.me} connection={connection} />
      <p role="status" className="sr-only">
        {said}
      </p>
      <div className="ledger" ref={ledger} {...(!readOnly && drag.handlers)}>
        <div className="pages-end" aria-hidden="true">
          <div className="verso" />
          <div className="recto" />
        </div>
        <HeadBand study={study} standings={standings} readOnly={readOnly} action={headAction}>
          <OpenRemarks studyId={study.id} onRemarks={onRemarks} />
        </HeadBand>
        {removal?.after === null && removed}
        {standings.map((standing, place) => (
          <Fragment key={standing.cell.id}>
            <CellBand
              studyId={study.id}
              connection={connection}
              standing={standing}
              cells={cells}
              uploads={uploads}
              readOnly={readOnly}
              page={source.pageOf(standing.cell)}
              onPage={(page) => source.choose(standing.cell.id, page)}
              renaming={renaming === standing.cell.id}
              onRename={(name) => void actions.rename(standing.cell, name)}
              onRenamed={() => setRenaming(undefined)}
              actions={{
                fold: {
                  words: folded.isFolded(standing.cell.id) ? "Unfold" : "Fold to a line",
                  go: () => folded.fold(standing.cell.id, !folded.isFolded(standing.cell.id)),
                },
                compareWith: compareWith(standing),
                ...(!readOnly && { changes: changesOf(standing, place) }),
              }}
              remarking={remarking}
              typing={typing.get(standing.cell.id) ?? NOBODY}
              onFocus={focus}
              isFolded={folded.isFolded(standing.cell.id)}
              onUnfold={(cellId) => folded.fold(cellId, false)}
              edge={drag.edgeOf(standing.cell.id)}
            />
            {removal?.after === standing.cell.id && removed}
          </Fragment>
        ))}
        {!readOnly && <AddCellBand onAdd={(kind) => void actions.add(kind).then(refocus)} />}
        {places.width > 0 && (
          <Thread
            stops={stops}
            width={places.width}
            height={places.height}
            focused={focused}
            addressOf={addressOf}
            onFollow={focusBand}
            onMove={step}
          />
        )}
      </div>
    </div>
  );
}

/** Who else is typing, by cell. */
function useTypists(connection: OpenStudy["connection"]): ReadonlyMap<string, readonly Present[]> {
  const whereabouts = useStudyPart(connection, "whereabouts");
  const people = useStudyPart(connection, "people");
  const you = useStudyPart(connection, "you");
  return useMemo(() => {
    const present = presentPeople(people, whereabouts, you);
    const cells = new Set(whereabouts.flatMap(({ cell }) => cell ?? []));
    return new Map(
      [...cells].map((cellId) => {
        const there = new Set(typists(cellId, whereabouts, you).map(({ id }) => id));
        return [cellId, present.filter(({ person }) => there.has(person.id))];
      }),
    );
  }, [whereabouts, people, you]);
}
