import { type ReactNode, useId, useState } from "react";
import type { SealedContent } from "../../../shared/schemas/referee-copy.ts";
import { capital, listWords } from "../../../shared/study/words.ts";
import { SYSTEMS } from "../../../shared/systems/index.ts";
import { DECIMALS, printCount, printFixed } from "../../../shared/tables/numbers.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { standardErrorsPhrase } from "../../../shared/tables/standard-errors.ts";

/** The specification in words, one line a question. */
export function specificationLines({
  system,
  slutsky,
  program,
  data,
}: SealedContent): [question: string, answer: string][] {
  const { fitted, convergence } = system;
  const form = `${capital(SYSTEMS[fitted.form].longName)}, ${printCount(fitted.goods.length)} goods`;
  const iterations = convergence.iterations === 1 ? "1 iteration" : `${convergence.iterations} iterations`;
  const total = printFixed(slutsky.point.total * slutsky.totalScale, DECIMALS.money);
  const lines: [string, string | undefined][] = [
    ["Form", form],
    ["Price index", fitted.index],
    ["Intercepts shift with", listWords(fitted.demographics) || "nothing"],
    ["Imposed", listWords(fitted.imposed) || "nothing"],
    ["Estimator", `${system.estimator}, converged in ${iterations}`],
    ["Standard errors", capital(standardErrorsPhrase(system))],
    ["Evaluated at", `${withArticle(slutsky.pointName)}, expenditure ${total} in the units uploaded`],
    ["Expenditure", "taken as exogenous"],
    ["Rows", `${printCount(system.rows)}${data.weighted ? ", weighted" : ""}`],
    ["Program", program],
  ];
  return lines.filter((line): line is [string, string] => line[1] !== undefined);
}

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
