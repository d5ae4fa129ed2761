import { statesNegativity } from "../../../shared/economics/checks.ts";
import type { TheoryChecks } from "../../../shared/schemas/checks.ts";
import { type FittedCoefficients, whyNotDefined } from "../../../shared/systems/index.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import type { RunControl } from "../run.ts";
import { forEachRow } from "./rows.ts";

export type SampleChecks = NonNullable<TheoryChecks["sample"]>;

/**
 * Negativity and monotonicity at every row used (methods 3.1): how many rows break each, and the
 * weighted share that holds. A row is regular when both hold. Negativity is counted only where it is stated. Rows in
 * which the system is not defined are counted apart: no law is judged there, and they are not regular (methods 3.4).
 */
export function checkSample(fitted: FittedCoefficients, data: PreparedData, control: RunControl): SampleChecks {
  const negativity = new Tally();
  const monotonicity = new Tally();
  const regular = new Tally();
  const defined = new Tally();
  const stated = statesNegativity(fitted);
  forEachRow(fitted, data, control, (row, _, weight) => {
    const isDefined = row.isDefined();
    defined.add(isDefined, weight);
    if (!isDefined) {
      regular.add(false, weight);
      return;
    }
    const isMonotone = row.monotonicityHolds();
    monotonicity.add(isMonotone, weight);
    if (!stated) return;
    const isNegative = row.negativityHolds();
    negativity.add(isNegative, weight);
    regular.add(isNegative && isMonotone, weight);
  });
  return {
    rows: data.rows,
    ...undefinedOf(fitted, defined),
    ...(stated && { negativity: negativity.result(defined.weight) }),
    monotonicity: monotonicity.result(defined.weight),
    ...(stated && { regular: regular.result(defined.weight) }),
  };
}

function undefinedOf({ form }: FittedCoefficients, defined: Tally): Pick<SampleChecks, "undefined"> {
  if (defined.breaks === 0) return {};
  const weightedShare = defined.breaking / defined.weight;
  return { undefined: { rows: defined.breaks, weightedShare, reason: whyNotDefined(form) } };
}

class Tally {
  breaks = 0;
  /** The weight of those that break. */
  breaking = 0;
  /** Of all rows added. */
  weight = 0;
  #holding = 0;

  add(holds: boolean, weight: number): void {
    this.weight += weight;
    if (holds) this.#holding += weight;
    else {
      this.breaks++;
      this.breaking += weight;
    }
  }

  result(ofWeight: number): { breaks: number; weightedShareThatHolds: number } {
    // Where nothing breaks the share is one, whatever the order in which weights were summed.
    const isWhole = this.breaks === 0 && this.weight === ofWeight;
    const share = isWhole ? 1 : this.#holding / ofWeight;
    return { breaks: this.breaks, weightedShareThatHolds: share };
  }
}
