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
import { useBandKeys } from "./use-band-keys.ts";
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
  const navigate = useNavigate();
  const focus = (cellId: string) => {
    setFocused(cellId);
    connection.goTo(cellId);
  };
  const move = (by: 1 | -1) => {
    const place = focused === undefined ? -1 : ids.indexOf(focused);
    const next = ids[Math.min(ids.length - 1, Math.max(0, place + by))];
    if (next !== undefined) focusBand(next);
  };
  const focusedCell = cells.find(({ id }) => id === focused);
  useBandKeys({
    move,
    open: () => focused !== undefined && navigate(pages.cell(study.id, focused)),
    swap: () => focusedCell && source.swap(focusedCell),
    remark: () => focused !== undefined && beginRemark(focused),
    leave: () => focused !== undefined && focusBand(focused),
  });
  const remove = (cell: CellSource, place: number) => {
    actions.remove(cell.id);
    removing.note(cell, ids[place - 1] ?? null);
  };
  const removed = removal && <RemovedCell cell={removal.cell} onUndo={removing.undo} onDismiss={removing.dismiss} />;
  const stops = stopsOf(standings, places.y);
  return (
    <div className="desk">
      <RemarkNews studyId={study.id} me={props.me} connection={connection} />
      <div className="ledger" ref={ledger}>
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
                rename: () => setRenaming(standing.cell.id),
                remove: () => remove(standing.cell, place),
                ...(place > 0 && { moveUp: () => actions.move(standing.cell.id, -1) }),
                ...(place < standings.length - 1 && { moveDown: () => actions.move(standing.cell.id, 1) }),
                ...(standing.kind === "data" && { uploads: onUploads }),
                compareWith: comparable(study.id, standing, standings, (to) => void navigate(to)),
              }}
              remarking={remarking}
              typing={typing.get(standing.cell.id) ?? NOBODY}
              onFocus={focus}
            />
            {removal?.after === standing.cell.id && removed}
          </Fragment>
        ))}
        {!readOnly && (
          <AddCellBand onAdd={(kind) => void actions.add(kind).then((added) => setTimeout(focusBand, 60, added))} />
        )}
        {places.width > 0 && (
          <Thread
            stops={stops}
            width={places.width}
            height={places.height}
            focused={focused}
            addressOf={addressOf}
            onFollow={focusBand}
            onMove={move}
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
