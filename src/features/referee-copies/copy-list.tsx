import type { RefereeCopySummary } from "../../../shared/schemas/referee-copies.ts";
import { Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { whenInWords } from "../../lib/dates.ts";
import { useRefereeCopies } from "./api/list-referee-copies.ts";
import { useRevokeRefereeCopy } from "./api/revoke-referee-copy.ts";

const inFours = (fingerprint: string) => (fingerprint.slice(0, 16).match(/.{4}/g) ?? []).join(" ");

function fateOf({ revokedAt, lastOpenedAt }: RefereeCopySummary): string {
  if (revokedAt) return `revoked ${whenInWords(revokedAt)}`;
  return lastOpenedAt ? `last opened ${whenInWords(lastOpenedAt)}` : "not opened yet";
}

/** Copies sealed so far, the newest first. A revoked one stays in the list, and its link answers nothing. */
export function CopyList({ studyId }: { studyId: string }) {
  const { data: copies = [], error } = useRefereeCopies(studyId);
  const revoke = useRevokeRefereeCopy(studyId);
  if (error) return <Fault>{sentenceOf(error)}</Fault>;
  if (copies.length === 0) return null;
  return (
    <section aria-labelledby="copies-sealed" className="pt-8">
      <h3 id="copies-sealed" className="type-section pb-2">
        Sealed so far
      </h3>
      <ul>
        {copies.map((copy) => (
          <li
            key={copy.id}
            className="flex flex-wrap items-baseline justify-between gap-x-6 border-rule border-t py-2.5 last:border-b"
          >
            <div className="min-w-0">
              <p>
                <b>{copy.cellName}</b>, sealed {whenInWords(copy.sealedAt)} by {copy.sealedBy}; {fateOf(copy)}
              </p>
              {copy.note && <p className="text-ink2">{copy.note}</p>}
              <p className="type-source text-ink3">{inFours(copy.fingerprint)}</p>
            </div>
            {!copy.revokedAt && (
              <Word disabled={revoke.isPending} onClick={() => revoke.mutate(copy.id)}>
                Revoke <span className="sr-only">the copy of {copy.cellName}</span>
              </Word>
            )}
          </li>
        ))}
      </ul>
      {revoke.isError && <Fault>{sentenceOf(revoke.error)}</Fault>}
    </section>
  );
}
