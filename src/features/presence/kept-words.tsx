import { useEffect, useState } from "react";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { counted } from "../../../shared/study/words.ts";
import { Word } from "../../components/button.tsx";
import { type KeptWords as Kept, keptWords, letGo } from "../../sync/index.ts";

interface KeptWordsProps {
  readonly accountId: string;
  readonly studyId: string;
  /** The study as the server has it; without it, all that is kept is shown. */
  readonly cells?: readonly CellSource[];
  /** Why they were not taken, in a sentence. */
  readonly because: string;
}

/** Edits made here that the server did not take: never dropped in silence, shown to be copied, kept until let go. */
export default function KeptWords({ accountId, studyId, cells, because }: KeptWordsProps) {
  const [kept, setKept] = useState<Kept>();
  useEffect(() => {
    let isHere = true;
    keptWords(accountId, studyId).then(
      (found) => isHere && setKept(found),
      // A browser that keeps nothing has nothing to show.
      () => {},
    );
    return () => {
      isHere = false;
    };
  }, [accountId, studyId]);
  const own = kept?.cells.filter((cell) => !cells?.some((one) => isSame(one, cell))) ?? [];
  if (kept === undefined || own.length === 0) return null;
  const forget = () => void letGo(accountId, studyId).finally(() => setKept(undefined));
  return (
    <section aria-labelledby="kept-words" className="kept-words">
      <h2 id="kept-words" className="type-section">
        {counted(kept.edits, "edit")} of yours {kept.edits === 1 ? "was" : "were"} not taken
      </h2>
      <p className="type-prose pt-1">{because} What you wrote is kept in this browser: copy what you need.</p>
      <ul className="grid gap-4 pt-3">
        {own.map((cell) => (
          <li key={cell.id}>
            <p className="flex flex-wrap items-baseline gap-x-4">
              <b className="font-serif font-medium">{cell.name}</b> <i className="text-ink2">{cell.kind}</i>
              <CopyWords name={cell.name} words={cell.source} />
            </p>
            <pre className="type-source overflow-x-auto whitespace-pre-wrap pt-1 wrap-anywhere">{cell.source}</pre>
          </li>
        ))}
      </ul>
      <Word quiet className="mt-3" onClick={forget}>
        Let them go
      </Word>
    </section>
  );
}

function CopyWords({ name, words }: { name: string; words: string }) {
  const [said, setSaid] = useState("Copy");
  const copy = () =>
    void navigator.clipboard.writeText(words).then(
      () => setSaid("Copied"),
      () => setSaid("Select it and copy by hand"),
    );
  return (
    <Word className="type-small" onClick={copy}>
      {said} <span className="sr-only">{name}</span>
    </Word>
  );
}

const isSame = (a: CellSource, b: CellSource) => a.id === b.id && a.name === b.name && a.source === b.source;
