import type { ReactNode } from "react";
import type { SlutskyFinding } from "../../../shared/schemas/slutsky.ts";
import { capital } from "../../../shared/study/words.ts";
import { DECIMALS, printCount, printFixed, printSize, THIN_SPACE } from "../../../shared/tables/numbers.ts";
import { matrixInForm, printEntry } from "../../../shared/tables/slutsky-matrix.ts";
import { EntryFormula, QuantityFormula } from "./entry-formula.tsx";
import type { Interval } from "./intervals.ts";
import type { Place } from "./moves.ts";
import type { ShownMatrix } from "./shown-matrix.ts";
import { printSum } from "./sums.ts";

export type PanelFinding = Pick<
  SlutskyFinding,
  "at" | "fitted" | "point" | "pointName" | "priceScale" | "totalScale" | "conditionalOn"
>;

interface EntryPanelProps {
  readonly finding: PanelFinding;
  readonly shown: ShownMatrix;
  readonly place: Place;
  /** On a phone the panel stands below the matrix and says less. */
  readonly brief?: boolean;
}

/** What an entry makes of two goods; the interval decides, not the point. */
export function entryWord(entry: number, [low, high]: Interval, own: boolean): string {
  if (own) return "Own price";
  if (low <= 0 && high >= 0) return "Undecided";
  return entry > 0 ? "Net substitutes" : "Net complements";
}

function Line({ label, children }: { label: string; children: ReactNode }) {
  return (
    <div className="flex justify-between gap-3">
      <dt>{label}</dt>
      <dd className="text-right tabular-nums">{children}</dd>
    </div>
  );
}

/** The other form's entry, with what it is in. */
function OtherForm({ finding, shown, place: [i, j] }: EntryPanelProps) {
  const form = shown.form === "share" ? "quantity" : "share";
  const other = matrixInForm(finding, form);
  const label = form === "share" ? "Share form" : "Quantity form, units uploaded";
  const power = other.exponent === 0 ? "" : ` × 10`;
  return (
    <Line label={label}>
      {printEntry(other.entries[i][j], other)}
      {power && (
        <>
          {power}
          <sup>{printFixed(other.exponent, 0)}</sup>
        </>
      )}
    </Line>
  );
}

function Elasticity({ finding, place: [i, j] }: { finding: PanelFinding; place: Place }) {
  const { compensated, compensatedErrors } = finding.at;
  return (
    <>
      {printFixed(compensated[i][j], DECIMALS.elasticity)} ({printFixed(compensatedErrors[i][j], DECIMALS.elasticity)})
    </>
  );
}

function Facts(props: EntryPanelProps) {
  const { finding, shown, place } = props;
  const [i, j] = place;
  const { goods, entries, full } = shown;
  if (i === j) {
    return (
      <dl className="text-[0.875rem]/[1.4375rem]">
        <Line label="Compensated elasticity">
          <Elasticity finding={finding} place={place} />
        </Line>
        <OtherForm {...props} />
      </dl>
    );
  }
  const difference = entries[i][j] - entries[j][i];
  return (
    <dl className="text-[0.875rem]/[1.4375rem]">
      <Line label={`Mirror, ${goods[j]} by ${goods[i]}`}>{full(entries[j][i])}</Line>
      <Line label="Difference from the mirror">{printSum(difference, finding.at.checks.tolerance, printSize)}</Line>
      <Line label="Compensated elasticity">
        <Elasticity finding={finding} place={place} />
      </Line>
      <Line label="Its mirror">
        <Elasticity finding={finding} place={[j, i]} />
      </Line>
      <OtherForm {...props} />
    </dl>
  );
}

/** Everything about the entry pointed at: what it means, how sure, its mirror, its elasticities and its formula. */
export function EntryPanel(props: EntryPanelProps) {
  const { finding, shown, place, brief = false } = props;
  const [i, j] = place;
  const { goods, full } = shown;
  const entry = shown.entries[i][j];
  const error = shown.errors[i][j];
  const [low, high] = shown.intervalAt(i, j);
  const drawn = finding.at.intervals ? `, percentiles of ${printCount(finding.at.intervals.draws)} draws` : "";
  const interval = `95${THIN_SPACE}% interval ${full(low)} to ${full(high)}${drawn}`;
  return (
    <section aria-label="Entry pointed at" className={brief ? "border-accent border-t-2 pt-2.5" : ""}>
      <p className="type-small text-ink2">
        Row {goods[i]}, column {goods[j]}
      </p>
      <div role="status">
        <h2 className="type-section">{capital(entryWord(entry, [low, high], i === j))}</h2>
        <p className="type-entry max-[599px]:text-[1.75rem]/[2.25rem]">
          {full(entry)} <span className="text-[0.6em] text-ink2">({full(error)})</span>
        </p>
        <p className="type-small text-ink2 tabular-nums">{interval}</p>
      </div>
      <div className="mt-2.5 border-rule2 border-t pt-2">
        <Facts {...props} />
      </div>
      <div className="mt-2 border-rule2 border-t pt-2">
        {shown.form === "quantity" && <QuantityFormula finding={finding} place={place} printed={full(entry)} />}
        <EntryFormula finding={finding} place={place} />
      </div>
    </section>
  );
}
