import { useId, useState } from "react";
import type { SealedContent } from "../../../shared/schemas/referee-copy.ts";
import { printSize } from "../../../shared/tables/numbers.ts";
import { Button } from "../../components/button.tsx";
import { Printed } from "../../components/number.tsx";
import { Table } from "../../components/table.tsx";
import { usePhone } from "../../components/use-media.ts";
import { VerdictFigure } from "../../components/verdict-figure.tsx";
import { durationInWords } from "../../lib/dates.ts";
import type { Verification } from "../../workers/verify-copy.ts";
import { agrees, partsCompared } from "./agreement.ts";
import type { VerificationState } from "./use-verification.ts";

interface RecomputedProps {
  readonly result: VerificationState;
  readonly content: SealedContent;
  readonly onAgain: () => void;
}

function StateLine({ good, words }: { good: boolean; words: string }) {
  return (
    <p className={`flex items-center gap-2.5 font-semibold ${good ? "text-accent" : "text-fail"}`}>
      <VerdictFigure shape={good ? "holds" : "breaks"} />
      {words}
    </p>
  );
}

function Differences({ verification, content }: { verification: Verification; content: SealedContent }) {
  return (
    <Table
      className="mt-3"
      caption="Recomputed from the sealed coefficients"
      heads={[
        { key: "part", content: "Recomputed from the sealed coefficients" },
        { key: "what", content: "What", align: "left" },
        { key: "difference", content: "Largest difference from the seal" },
      ]}
      lines={partsCompared(verification, content).map(({ part, what, difference, agrees: good }) => ({
        key: part,
        head: part,
        cells: [
          <span key="what" className="text-ink2">
            {what}
          </span>,
          <span key="difference" className={good ? "" : "font-semibold text-fail"}>
            <Printed text={good ? difference : `differs, ${difference}`} />
          </span>,
        ],
      }))}
    />
  );
}

function Found({ verification, content }: { verification: Verification; content: SealedContent }) {
  const good = agrees(verification);
  const took = durationInWords(verification.tookMs);
  const where = `Matrix, standard errors, eigenvalues and checks were computed again on your machine in ${took}, from the coefficients below, and set against the sealed ones.`;
  return (
    <div role="status">
      <StateLine
        good={good}
        words={good ? "Recomputed in this browser" : "Recomputed in this browser, and it does not agree"}
      />
      <h2 className="mt-1 font-serif text-[1.75rem]/[2.25rem]">
        Largest difference <Printed text={printSize(verification.largest)} />
      </h2>
      <p className="max-w-[47rem] text-[0.9375rem]/[1.375rem] text-ink2">
        {where}
        {content.slutsky.at.intervals &&
          " The intervals of the bootstrap rest on draws that are not sealed; they stand here as they were sealed."}
        {!good &&
          " What does not agree was changed after it was sealed, or was never computed from these coefficients."}
      </p>
    </div>
  );
}

/** What the reader's own browser makes of the copy: the largest difference first, then each part's. */
export function Recomputed({ result, content, onAgain }: RecomputedProps) {
  const phone = usePhone();
  const [unfolded, setUnfolded] = useState(false);
  const id = useId();
  const shown = !phone || unfolded;
  return (
    <section aria-label="Recomputation" className="border-accent border-t-2 pt-3.5">
      <div className="flex flex-wrap items-start justify-between gap-x-6 gap-y-3">
        {result.state === "computing" && (
          <p role="status" className="min-h-24 text-ink2">
            Recomputing in this browser
          </p>
        )}
        {result.state === "failed" && (
          <div role="status" className="max-w-[47rem]">
            <StateLine good={false} words="Could not be recomputed" />
            <p className="pt-1 text-ink2">{result.reason}.</p>
          </div>
        )}
        {result.state === "done" && (
          <div className="min-w-0 flex-1 basis-72">
            <Found verification={result.verification} content={content} />
          </div>
        )}
        <div className="flex items-center gap-5 print:hidden">
          <Button disabled={result.state === "computing"} onClick={onAgain}>
            Recompute
          </Button>
          {phone && (
            <button
              type="button"
              className="word"
              aria-expanded={unfolded}
              aria-controls={id}
              onClick={() => setUnfolded(!unfolded)}
            >
              Each difference
            </button>
          )}
        </div>
      </div>
      <div id={id}>
        {shown && result.state === "done" && <Differences verification={result.verification} content={content} />}
      </div>
    </section>
  );
}
