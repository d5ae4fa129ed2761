import type { SystemFinding } from "../../../shared/schemas/system.ts";
import { withArticle } from "../../../shared/tables/slutsky-matrix.ts";
import { systemVerdicts, type Verdict } from "../../../shared/tables/verdicts.ts";
import { Printed } from "../../components/number.tsx";
import { VerdictFigure } from "../../components/verdict-figure.tsx";
import { BesideLines, BesideSection } from "./beside.tsx";

interface VerdictsProps {
  readonly left: SystemFinding;
  readonly right: SystemFinding;
  readonly names: readonly [string, string];
}

function OneVerdict({ verdict: { figure, word, note } }: { verdict: Verdict }) {
  return (
    <div className="flex flex-wrap items-baseline gap-x-3">
      <span className="flex items-center gap-2 font-semibold text-ink">
        <VerdictFigure shape={figure} />
        {word}
      </span>
      <span className="type-small text-ink2">
        <Printed text={note} />
      </span>
    </div>
  );
}

/** The five laws of both systems, in their order. */
export function VerdictsSection({ left, right, names }: VerdictsProps) {
  const [ours, theirs] = [systemVerdicts(left), systemVerdicts(right)];
  const points = [left.checks.pointName, right.checks.pointName];
  const said =
    points[0] === points[1]
      ? `Both at ${withArticle(points[0])}.`
      : `${names[0]} at ${withArticle(points[0])}, ${names[1]} at ${withArticle(points[1])}.`;
  return (
    <BesideSection title="What theory says" said={said}>
      <BesideLines
        names={names}
        lines={ours.map((verdict, i) => ({
          key: verdict.law,
          head: verdict.law,
          left: <OneVerdict verdict={verdict} />,
          right: <OneVerdict verdict={theirs[i]} />,
        }))}
      />
    </BesideSection>
  );
}
