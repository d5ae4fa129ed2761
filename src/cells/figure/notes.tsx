import type { FigureFinding } from "../../../shared/schemas/figure.ts";
import { figureNotes } from "../../../shared/tables/figure-words.ts";
import { WELFARE_CAUTION } from "../../../shared/tables/price-change-words.ts";
import { verdictsOf } from "../../../shared/tables/verdicts.ts";
import { Printed } from "../../components/number.tsx";
import { VerdictStrip } from "../../components/verdict-strip.tsx";
import { stripOf } from "../verdicts.ts";

interface OwnProps {
  readonly finding: FigureFinding;
}

/** What theory says of the system beneath; nothing of a figure of data. */
export function FigureVerdicts({ finding: { checks, tests, drawn }, detail = false }: OwnProps & { detail?: boolean }) {
  if (checks === undefined || tests === undefined) return null;
  const label = drawn.show === "incidence" ? "What theory says at the new prices" : "What theory says of the system";
  return <VerdictStrip label={label} verdicts={stripOf(verdictsOf(checks, tests, { detail }))} />;
}

/** Before the figures that can hurt, in the words every such finding has. */
export function FigureCaution({ finding }: OwnProps) {
  if (finding.drawn.show !== "incidence") return null;
  return (
    <section
      aria-label="Read with care"
      className="border-stale border-y py-2 text-[0.875rem]/[1.25rem] min-[600px]:flex min-[600px]:gap-x-4"
    >
      <strong className="shrink-0 font-semibold text-stale">Read with care</strong>
      <p className="max-w-[96ch]">{WELFARE_CAUTION}</p>
    </section>
  );
}

/** Conventions below the figure. */
export function FigureNotes({ finding }: OwnProps) {
  const { show } = finding.drawn;
  return (
    <div className="type-small max-w-[80ch] space-y-1 text-ink2">
      {show === "elasticities" && finding.drawn.groups.length > 1 && (
        <p>Groups from top to bottom in their order: the first filled, the last a square. Dotted lines at 1 and −1.</p>
      )}
      <p>
        <Printed
          text={figureNotes(finding)
            .filter((note) => note !== WELFARE_CAUTION)
            .join(" ")}
        />
      </p>
    </div>
  );
}
