import { printPercent, printQuantity } from "../../../shared/tables/numbers.ts";
import { Button, Word } from "../../components/button.tsx";
import { Unreadable } from "../form/fields.tsx";
import { readWritten } from "../form/written.ts";
import type { FormProps, OpenProps } from "../types.ts";
import { atRest, EXPENDITURE, editsTo, rateOf, withRate } from "./rates.ts";
import { Ruler } from "./ruler.tsx";
import { rulerScale } from "./ruler-scale.ts";
import { useTrial } from "./trial.ts";

/** Rulers of every price and of total expenditure: who reads may try, who writes may keep what was tried. */
export function PriceRulers({ finding, form }: OpenProps<"price change">) {
  const { question, isTried, shown, ask } = useTrial(finding);
  const rest = atRest(finding, question);
  return (
    <section aria-label="Try other prices" className="no-print mb-6 border-rule2 border-b pb-5">
      <div className="flex items-baseline justify-between gap-4">
        <h2 className="type-small text-ink2">Change in each price</h2>
        <Word
          className="type-small"
          disabled={editsTo(rest, question).length === 0}
          onClick={() => ask(rest)}
          aria-label="All prices to no change"
        >
          All to 0
        </Word>
      </div>
      {[...finding.fitted.goods, EXPENDITURE].map((good) => (
        <Ruler
          key={good}
          scale={rulerScale(finding, question, good)}
          isMoved={rateOf(question, good) !== rateOf(finding.question, good)}
          onMove={(rate) => ask(withRate(finding.question, question, good, rate))}
        />
      ))}
      <div className="mt-4">
        <InShort finding={shown} />
        {isTried ? (
          <Tried finding={finding} form={form} />
        ) : (
          <p className="type-small text-ink2">The rulers stand at what is stored. Move one to try another price.</p>
        )}
      </div>
    </section>
  );
}

/** What is tried, in one line: where the page is narrow, the finding stands far below the rulers. */
function InShort({ finding: { at } }: OpenProps<"price change">) {
  const loss = at.welfare?.compensating ?? at.secondOrder;
  const name = at.welfare ? "Compensating variation" : "Loss to second order";
  return (
    <p className="type-small mb-2.5 tabular-nums">
      {name} {printQuantity(loss.value, "money")} ({printQuantity(loss.error, "money")}),{" "}
      {printPercent(loss.value / at.totalBefore)} of expenditure.
    </p>
  );
}

function Tried({ finding, form }: OpenProps<"price change">) {
  const { question, ask } = useTrial(finding);
  const back = (
    <Word className="type-small" onClick={() => ask(finding.question)}>
      Back to what is stored
    </Word>
  );
  if (!form || form.readOnly) {
    return (
      <>
        <p className="type-small mb-1.5 text-ink2">
          Trying out, not stored. Whoever reads may try; {form ? "owners and coauthors keep." : "nothing is kept here."}
        </p>
        {back}
      </>
    );
  }
  const edits = editsTo(finding.question, question);
  return (
    <div className="flex flex-wrap items-center gap-x-5 gap-y-2">
      <Keep form={form} edits={edits} />
      {back}
    </div>
  );
}

function Keep({ form, edits }: { form: FormProps; edits: ReturnType<typeof editsTo> }) {
  const written = readWritten("price change", form);
  if (!written.readable) return <Unreadable />;
  return (
    <Button filled onClick={() => written.write(...edits)}>
      Keep this price change
    </Button>
  );
}
