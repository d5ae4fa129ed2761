import type { ReactNode } from "react";
import type { RefereeCopy, SealedContent } from "../../../shared/schemas/referee-copy.ts";
import { listWords } from "../../../shared/study/words.ts";
import { Mark } from "../../components/mark.tsx";
import { fullMoment } from "../../lib/dates.ts";
import { Downloads } from "./downloads.tsx";
import { Fingerprint, FingerprintVerdict } from "./fingerprint-words.tsx";
import { NewerCopy } from "./newer-copy.tsx";
import { Recomputed } from "./recomputed.tsx";
import { Seal } from "./seal.tsx";
import { SealedAccounting } from "./sealed-accounting.tsx";
import { Specification } from "./specification.tsx";
import { useVerification, type VerificationState, type Verify } from "./use-verification.ts";

export interface SealedCopyProps {
  readonly copy: RefereeCopy;
  readonly verify?: Verify;
  /** Verdicts, matrix with the entry pointed at, eigenvalues: the study's own views of the sealed findings. */
  readonly verdicts: ReactNode;
  readonly matrix: ReactNode;
  readonly coefficients: ReactNode;
  /** Further findings and methods, where there are any. */
  readonly also?: ReactNode;
  /** Opens the copy that has replaced this one. */
  readonly onNewer?: () => void;
}

function SealedHead({ copy, result }: { copy: RefereeCopy; result: VerificationState }) {
  return (
    <header className="bg-verso px-4.5 py-4 min-[900px]:pt-8 min-[900px]:pr-11 min-[900px]:pb-2 min-[900px]:pl-21 max-[899px]:border-rule2 max-[899px]:border-b">
      <div className="flex items-center justify-between">
        <span className="flex items-center gap-3 font-serif text-[1.1875rem]/[1.5rem] font-medium">
          <Mark size={26} /> Tangency
        </span>
        <span className="text-ink2 min-[900px]:hidden">Referee copy</span>
      </div>
      <div className="mt-4 flex items-center gap-6 min-[900px]:mt-14 min-[900px]:block">
        <Seal
          fingerprint={copy.fingerprint}
          className="w-24 shrink-0 min-[900px]:mb-10 min-[900px]:-ml-3 min-[900px]:w-62"
        />
        <div>
          <h2 className="font-serif text-[1.625rem]/[2rem] max-[899px]:hidden">Referee copy</h2>
          <p className="mb-2 text-[0.9375rem]/[1.375rem] text-ink2">
            Sealed {fullMoment(copy.content.sealedAt)}.
            <span className="max-[899px]:hidden"> Nothing in it can change.</span>
          </p>
          <p className="type-small mt-5 mb-1 text-ink2 max-[899px]:hidden">Fingerprint, SHA-256</p>
          <Fingerprint fingerprint={copy.fingerprint} />
          <FingerprintVerdict result={result} />
          <p className="type-small mt-2 text-ink2 max-[899px]:hidden">
            The drawing is the fingerprint: sixteen tangents of one circle, each placed by one byte and measured by the
            next. Change one coefficient and another figure appears.
          </p>
        </div>
      </div>
    </header>
  );
}

/** A note may end as its author likes; what follows it begins a sentence. */
const asSentence = (note: string) => (note === "" || /[.!?…]$/.test(note) ? note : `${note}.`);

function Title({ content }: { content: SealedContent }) {
  const { title, authors } = content.study;
  const by = authors === undefined ? "Authors withheld for review." : `By ${listWords(authors)}.`;
  return (
    <div>
      <h1 className="type-title min-[900px]:text-[2.375rem]/[2.875rem]">{title}</h1>
      <p className="mt-1 mb-5 text-[0.9375rem]/[1.375rem] text-ink2">
        {asSentence(content.note)} {by}
      </p>
    </div>
  );
}

/** A sealed copy as a referee reads it: no account, nothing to change, everything computed again. */
export function SealedCopy({ copy, verify, verdicts, matrix, coefficients, also, onNewer }: SealedCopyProps) {
  const { result, again } = useVerification(copy, verify);
  const { content } = copy;
  return (
    <div className="min-h-dvh bg-recto min-[900px]:grid min-[900px]:grid-cols-[minmax(20rem,27.5rem)_minmax(0,1fr)] min-[900px]:grid-rows-[auto_1fr] print:block">
      <SealedHead copy={copy} result={result} />
      <main className="min-w-0 min-[900px]:border-rule2 min-[900px]:border-l space-y-7 px-4.5 py-6 min-[900px]:row-span-2 min-[900px]:max-w-[62.5rem] min-[900px]:px-11 min-[900px]:py-9">
        <Title content={content} />
        {copy.newer && onNewer && <NewerCopy newer={copy.newer} onOpen={onNewer} />}
        <Recomputed result={result} content={content} onAgain={() => void again()} />
        {verdicts}
        {matrix}
        <div className="grid gap-x-12 gap-y-8 border-line border-t pt-4 min-[1180px]:grid-cols-[minmax(0,1.4fr)_minmax(0,1fr)]">
          <Specification content={content} coefficients={coefficients} />
          <SealedAccounting content={content} />
        </div>
        {also}
      </main>
      <aside className="bg-verso px-4.5 pt-6 pb-10 min-[900px]:pr-11 min-[900px]:pl-21 max-[899px]:bg-recto max-[899px]:border-line max-[899px]:border-t print:hidden">
        <Downloads copy={copy} />
        <p className="type-small mt-6 border-rule2 border-t pt-3 text-ink2">
          You need no account. No household’s data is in this copy, and none is needed to check it.
        </p>
      </aside>
    </div>
  );
}
