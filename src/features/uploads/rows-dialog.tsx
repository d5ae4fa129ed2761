import { type ReactNode, useState } from "react";
import type { RowsPage } from "../../../shared/schemas/rows.ts";
import { Button, Word } from "../../components/button.tsx";
import { Dialog } from "../../components/dialog.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { writeCount, writeNumber } from "../../lib/formats.ts";
import { ROWS_AT_ONCE, type RowsOf, useRows } from "./api/get-rows.ts";
import { RowsTable } from "./rows-table.tsx";

interface RowsDialogProps {
  readonly studyId: string;
  readonly of: RowsOf;
  readonly title: string;
  readonly lede?: string;
  readonly about?: (column: string) => string | undefined;
  /** Adds a condition to what the cell keeps; absent for those who only read. */
  readonly onKeep?: (expression: string) => void;
  readonly onClose: () => void;
  readonly children?: ReactNode;
}

/** Rows of an upload, a page at a time, and where there is one a condition that would leave them out. */
export default function RowsDialog({ studyId, of, title, lede, about, onKeep, onClose, children }: RowsDialogProps) {
  const [from, setFrom] = useState(0);
  const { data: page, error, isFetching } = useRows(studyId, of, from);
  return (
    <Dialog onClose={onClose} title={title} lede={lede} wide>
      {children}
      {error && <Fault>{sentenceOf(error)}</Fault>}
      {!page && !error && (
        <p role="status" className="text-ink2">
          Fetching the rows
        </p>
      )}
      {page && (
        <>
          <Pages page={page} isFetching={isFetching} onFrom={setFrom} />
          <RowsTable page={page} label={title} about={about} />
          {page.keep && <KeepOffer keep={page.keep} total={page.total} onKeep={onKeep} onDone={onClose} />}
        </>
      )}
    </Dialog>
  );
}

interface PagesProps {
  readonly page: RowsPage;
  readonly isFetching: boolean;
  readonly onFrom: (from: number) => void;
}

function Pages({ page: { total, from, rows }, isFetching, onFrom }: PagesProps) {
  const last = from + rows.length;
  const shown =
    total === 0 ? "No row" : `${writeNumber(from + 1)} to ${writeNumber(last)} of ${writeCount(total, "row")}`;
  return (
    <div className="flex flex-wrap items-baseline gap-x-5 gap-y-1 pb-2">
      <p role="status" className="type-small text-ink2">
        {isFetching ? "Fetching the rows" : shown}
      </p>
      {total > ROWS_AT_ONCE && (
        <>
          <Word disabled={from === 0} onClick={() => onFrom(Math.max(0, from - ROWS_AT_ONCE))}>
            Earlier
          </Word>
          <Word disabled={last >= total} onClick={() => onFrom(from + ROWS_AT_ONCE)}>
            Later
          </Word>
          <Word
            quiet
            disabled={last >= total}
            onClick={() => onFrom(Math.floor((total - 1) / ROWS_AT_ONCE) * ROWS_AT_ONCE)}
          >
            Last
          </Word>
        </>
      )}
    </div>
  );
}

interface KeepOfferProps {
  readonly keep: NonNullable<RowsPage["keep"]>;
  readonly total: number;
  readonly onKeep?: (expression: string) => void;
  readonly onDone: () => void;
}

/** Offered, never taken by itself: a row that is unusual may be right. */
function KeepOffer({ keep: { expression, leavesOut }, total, onKeep, onDone }: KeepOfferProps) {
  const all =
    leavesOut === total ? (total === 1 ? "it" : `all ${writeNumber(total)}`) : `${writeNumber(leavesOut)} of them`;
  return (
    <section aria-label="A condition that leaves them out" className="mt-4">
      <p className="text-[0.875rem]/[1.25rem]">
        To leave out {all} and no other row used, keep only rows with{" "}
        <code className="type-source bg-verso px-1">{expression}</code>.
      </p>
      {onKeep && (
        <Button
          className="mt-2"
          onClick={() => {
            onKeep(expression);
            onDone();
          }}
        >
          Add it to keep
        </Button>
      )}
    </section>
  );
}
