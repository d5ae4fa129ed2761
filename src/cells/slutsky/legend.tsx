import { printFixed } from "../../../shared/tables/numbers.ts";
import { SCALE_TOKENS } from "./scale.ts";

/** A step to the digits it has, two decimals at least below one: 0.10, 0.002. */
function printStep(step: number): string {
  const significant = Math.max(0, 1 - Math.floor(Math.log10(step)));
  const digits = step.toFixed(significant).replace(/0$/, "");
  const decimals = digits.split(".")[1]?.length ?? 0;
  return printFixed(step, step < 1 ? Math.max(2, decimals) : decimals);
}

/** The steps as a sentence: "steps 0.002, 0.01, 0.03, 0.06, 0.10". */
export function stepsInWords(steps: readonly number[]): string {
  return `steps ${steps.map(printStep).join(", ")}`;
}

/** The scale with its steps printed under it; its two ends named in words. */
export function MatrixLegend({ steps, unit }: { steps: readonly number[]; unit?: string }) {
  const bounds = [...steps.toReversed().map((step) => -step), ...steps];
  return (
    <figure className="type-small text-ink2 print:hidden" aria-label="Scale of the matrix">
      <div className="flex" aria-hidden="true">
        {SCALE_TOKENS.map((token) => (
          <span key={token} className="h-2 flex-1" style={{ backgroundColor: `var(--${token})` }} />
        ))}
      </div>
      <div className="relative mt-1 h-[1.125rem]">
        {bounds.map((bound, index) => (
          <span
            key={bound}
            className="absolute -translate-x-1/2 tabular-nums"
            style={{ left: `${((index + 1) / SCALE_TOKENS.length) * 100}%` }}
          >
            {bound < 0 ? `\u2212${printStep(-bound)}` : printStep(bound)}
          </span>
        ))}
      </div>
      <figcaption className="mt-1 flex justify-between">
        <span>complements, and the own price</span>
        {unit && <span>{unit}</span>}
        <span>substitutes</span>
      </figcaption>
    </figure>
  );
}

/** The scale in one line, for a band and a phone. */
export function MatrixLegendLine({ steps }: { steps: readonly number[] }) {
  return (
    <div className="flex flex-wrap items-center gap-x-3 type-small text-ink2 print:hidden">
      <span>Complements</span>
      <span className="flex min-w-36 max-w-72 flex-1" aria-hidden="true">
        {SCALE_TOKENS.map((token) => (
          <span key={token} className="h-2 flex-1" style={{ backgroundColor: `var(--${token})` }} />
        ))}
      </span>
      <span>Substitutes</span>
      <span className="text-ink3">{stepsInWords(steps)}</span>
    </div>
  );
}
