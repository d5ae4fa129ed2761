import { type FormulaParts, formulaParts } from "../../../shared/economics/formula.ts";
import type { SlutskyFinding } from "../../../shared/schemas/slutsky.ts";
import { DECIMALS, printFixed } from "../../../shared/tables/numbers.ts";
import { added, formulaDecimals } from "./formula.ts";
import { MathText } from "./math-text.tsx";
import type { Place } from "./moves.ts";

const SET = "font-serif text-[0.875rem]/[1.4375rem] tabular-nums lining-nums";

/** A line may break before the sign and never after it. */
const TIMES = "×\u00a0";

/** k_ij in letters; for the mirror with i and j exchanged, for an own price with its − w_i. */
function letters(own: boolean, i: string, j: string): string {
  if (own) return `k_${i}${i} = μ_${i}${i} \u2212 w_${i} + (w_${i} + μ_${i})w_${i}`;
  return `k_${i}${j} = μ_${i}${j} + (w_${i} + μ_${i})w_${j}`;
}

function Numbers({ parts }: { parts: FormulaParts }) {
  const decimals = formulaDecimals(parts);
  const print = (value: number) => printFixed(value, decimals);
  const outside = `${print(parts.priceSlope)}${parts.own ? ` ${added(-parts.share, decimals)}` : ""}`;
  const factor = `(${print(parts.share)} ${added(parts.totalSlope, decimals)})`;
  return (
    <>
      <div>
        = {outside} + {factor} {TIMES}
        {print(parts.otherShare)}
      </div>
      <div>
        = {outside} {added(parts.incomeTerm, decimals)} ={" "}
        <strong className="font-semibold">{printFixed(parts.value, DECIMALS.entry)}</strong>
      </div>
    </>
  );
}

/** μ_ij by the fitted system's own formula, with its numbers. */
function SlopeNote({ parts }: { parts: FormulaParts }) {
  const terms = parts.priceSlopeTerms;
  const sign = (value: 1 | -1, first: boolean) => (value < 0 ? "\u2212" : first ? "" : "+");
  const joined = (factor: (term: (typeof terms)[number]) => string) =>
    terms.map((term, index) => `${sign(term.sign, index === 0)}${index === 0 ? "" : " "}${factor(term)}`).join(" ");
  const print = (value: number, bracketed: boolean) => {
    const printed = printFixed(value, DECIMALS.coefficient);
    return value < 0 && bracketed ? `(${printed})` : printed;
  };
  const symbols = joined((term) => term.factors.map(({ symbol }) => symbol).join(" "));
  // For an own price j is i, in every index.
  const named = parts.own ? symbols.replace(/_[a-z]+/g, (index) => index.replaceAll("j", "i")) : symbols;
  const numbers = joined((term) =>
    term.factors
      .map(({ value }, index) => print(value, index > 0 || term.sign < 0 || term !== terms[0]))
      .join(` ${TIMES}`),
  );
  return (
    <p className="text-[0.8125rem]/[1.1875rem] text-ink2">
      with <MathText text={parts.own ? "μ_ii" : "μ_ij"} /> = <MathText text={named} /> = {numbers}
    </p>
  );
}

type Evaluated = Pick<SlutskyFinding, "fitted" | "point">;

interface QuantityProps {
  readonly finding: Pick<SlutskyFinding, "at" | "point" | "priceScale" | "totalScale">;
  readonly place: Place;
  /** S_ij as the matrix prints it. */
  readonly printed: string;
}

/** How an entry of the quantity form follows from its share form: S_ij = k_ij x/(p_i p_j), in the units uploaded. */
export function QuantityFormula({ finding, place: [i, j], printed }: QuantityProps) {
  const price = (good: number) => printFixed(finding.point.prices[good] * finding.priceScale[good], DECIMALS.money);
  const total = printFixed(finding.point.total * finding.totalScale, DECIMALS.money);
  const entry = printFixed(finding.at.share[i][j], DECIMALS.entry);
  return (
    <section aria-label="Formula of the quantity form" className={`${SET} mb-2`}>
      <div>
        <MathText text={i === j ? "S_ii = k_ii x/(p_i p_i)" : "S_ij = k_ij x/(p_i p_j)"} />
      </div>
      <div>
        = {entry} {TIMES}
        {total}/({price(i)} {TIMES}
        {price(j)}) = <strong className="font-semibold">{printed}</strong>
      </div>
    </section>
  );
}

/** The formula of an entry twice: once with its own numbers, once with its mirror's. Share form. */
export function EntryFormula({ finding, place: [i, j] }: { finding: Evaluated; place: Place }) {
  const own = i === j;
  const entry = formulaParts(finding.fitted, finding.point, i, j);
  return (
    <div className={`${SET} space-y-2`}>
      <section aria-label="Formula">
        <div>
          <MathText text={letters(own, "i", "j")} />
        </div>
        <Numbers parts={entry} />
      </section>
      <SlopeNote parts={entry} />
      {!own && (
        <section aria-label="Formula of the mirror">
          <div>
            <MathText text={letters(false, "j", "i")} />
          </div>
          <Numbers parts={formulaParts(finding.fitted, finding.point, j, i)} />
        </section>
      )}
    </div>
  );
}
