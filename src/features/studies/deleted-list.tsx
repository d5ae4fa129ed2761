import { useState } from "react";
import type { DeletedStudy } from "../../../shared/schemas/accounts.ts";
import { Button, Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { agoInWords, dateInWords } from "../../lib/dates.ts";
import { useSettleDeleted } from "./api/deleted-studies.ts";

/** Deleted studies, until they are gone for good. */
export function DeletedList({ studies }: { studies: readonly DeletedStudy[] }) {
  return (
    <section aria-label="Deleted studies">
      <p className="type-small pb-2 text-ink2">Latest deleted first</p>
      {studies.length === 0 ? (
        <p className="type-finding border-line border-t py-6">No deleted study waits to be brought back.</p>
      ) : (
        <ul className="border-line border-b">
          {studies.map((study) => (
            <DeletedEntry key={study.id} study={study} />
          ))}
        </ul>
      )}
    </section>
  );
}

function DeletedEntry({ study }: { study: DeletedStudy }) {
  const settle = useSettleDeleted();
  const [asked, setAsked] = useState(false);
  return (
    <li className="border-line border-t py-4">
      <h2 className="type-cell-name font-normal!">{study.title}</h2>
      <p className="pt-1 text-ink2">
        Deleted {agoInWords(study.deletedAt)}. It can be brought back until {dateInWords(study.purgedAt)}, with its
        cells, uploads, findings, remarks and referee copies.
      </p>
      {asked ? (
        <p className="flex flex-wrap items-center gap-x-5 gap-y-2 pt-3">
          <span>Gone for good, with its uploads and findings?</span>
          <Button disabled={settle.isPending} onClick={() => settle.mutate({ studyId: study.id, bringBack: false })}>
            Delete {study.title} for good
          </Button>
          <Word quiet onClick={() => setAsked(false)}>
            Keep it
          </Word>
        </p>
      ) : (
        <p className="flex items-center gap-5 pt-3">
          <Button disabled={settle.isPending} onClick={() => settle.mutate({ studyId: study.id, bringBack: true })}>
            Bring back <span className="sr-only">{study.title}</span>
          </Button>
          <Word onClick={() => setAsked(true)}>
            Delete for good <span className="sr-only">{study.title}</span>
          </Word>
        </p>
      )}
      {settle.isError && <Fault>{sentenceOf(settle.error)}</Fault>}
    </li>
  );
}
