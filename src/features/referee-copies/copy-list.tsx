import { Unfetched } from "../../components/unfetched.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useRefereeCopies } from "./api/list-referee-copies.ts";
import { CopyEntry } from "./copy-entry.tsx";
import type { Told } from "./sealed-link.tsx";

/** Copies sealed so far, the newest first. A revoked one stays in the list, and its link answers nothing. */
export function CopyList({ studyId, onTold }: { studyId: string; onTold: (told: Told) => void }) {
  const { data: copies = [], error, refetch } = useRefereeCopies(studyId);
  if (error) return <Unfetched sentence={sentenceOf(error)} onAgain={() => void refetch()} />;
  if (copies.length === 0) return null;
  return (
    <section aria-labelledby="copies-sealed" className="pt-8">
      <h3 id="copies-sealed" className="type-section pb-2">
        Sealed so far
      </h3>
      <ul>
        {copies.map((copy) => (
          <CopyEntry key={copy.id} studyId={studyId} copy={copy} copies={copies} onTold={onTold} />
        ))}
      </ul>
    </section>
  );
}
