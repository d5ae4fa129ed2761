import { type ReactNode, useId, useState } from "react";
import type { SealedContent } from "../../../shared/schemas/referee-copy.ts";
import { caveatSentences } from "../../../shared/tables/caveat-words.ts";
import { printCount } from "../../../shared/tables/numbers.ts";
import { specificationLines } from "./specification-lines.ts";

/** What was asked: in words, and as the text the study itself has. */
export function Specification({ content, coefficients }: { content: SealedContent; coefficients: ReactNode }) {
  const [open, setOpen] = useState<"coefficients" | "text" | undefined>();
  const id = useId();
  const word = (which: "coefficients" | "text", label: string) => (
    <button
      type="button"
      className="word type-small"
      aria-expanded={open === which}
      aria-controls={id}
      onClick={() => setOpen(open === which ? undefined : which)}
    >
      {label}
    </button>
  );
  return (
    <section aria-labelledby="specification">
      <h2 id="specification" className="type-section mb-1.5 text-[1.3125rem]">
        Specification
      </h2>
      <dl className="grid grid-cols-[minmax(6rem,8rem)_minmax(0,1fr)] gap-x-2 text-[0.9375rem]/[1.5625rem] max-[599px]:gap-y-1">
        {specificationLines(content).map(([question, answer]) => (
          <div key={question} className="contents">
            <dt className="text-ink2">{question}</dt>
            <dd>{answer}</dd>
          </div>
        ))}
      </dl>
      {content.slutsky.caveats && (
        <p className="type-small mt-1">{caveatSentences({ caveats: content.slutsky.caveats }).join(" ")}</p>
      )}
      <p className="mt-1 flex gap-4 print:hidden">
        {word("coefficients", `Coefficients, ${printCount(content.system.coefficients.length)} of them`)}
        {word("text", "As text")}
      </p>
      <div id={id} className="mt-2">
        {open === "coefficients" && coefficients}
        {open === "text" &&
          content.cells.sources.map(({ name, kind, source }) => (
            <div key={name} className="mb-3">
              <h3 className="text-[0.9375rem]">
                <span className="font-serif font-medium">{name}</span> <i className="font-serif text-ink2">{kind}</i>
              </h3>
              <pre className="type-source overflow-x-auto whitespace-pre-wrap">{source}</pre>
            </div>
          ))}
      </div>
    </section>
  );
}
