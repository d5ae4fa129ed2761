import { statesNegativity } from "../../../shared/economics/checks.ts";
import type { TheoryChecks } from "../../../shared/schemas/checks.ts";
import type { FittedCoefficients } from "../../../shared/systems/index.ts";
import type { PreparedData } from "../columns/prepared-data.ts";
import type { RunControl } from "../run.ts";
import { forEachRow } from "./rows.ts";

export type SampleChecks = NonNullable<TheoryChecks["sample"]>;

/**
 * Negativity and monotonicity at every row used (methods 3.1): how many rows break each, and the
 * weighted share that holds. A row is regular when both hold. Negativity is counted only where it is stated.
 */
export function checkSample(fitted: FittedCoefficients, data: PreparedData, control: RunControl): SampleChecks {
  const negativity = new Tally();
  const monotonicity = new Tally();
  const regular = new Tally();
  const stated = statesNegativity(fitted);
  forEachRow(fitted, data, control, (row, _, weight) => {
    const isMonotone = row.monotonicityHolds();
    monotonicity.add(isMonotone, weight);
    if (!stated) return;
    const isNegative = row.negativityHolds();
    negativity.add(isNegative, weight);
    regular.add(isNegative && isMonotone, weight);
  });
  return {
    rows: data.rows,
    ...(stated && { negativity: negativity.result() }),
    monotonicity: monotonicity.result(),
    ...(stated && { regular: regular.result() }),
  };
}

class Tally {
  #breaks = 0;
  #holding = 0;
  #weight = 0;

  add(holds: boolean, weight: number): void {
    this.#weight += weight;
    if (holds) this.#holding += weight;
    else this.#breaks++;
  }

  result(): { breaks: number; weightedShareThatHolds: number } {
    // Where nothing breaks the share is one, whatever the order in which weights were summed.
    const share = this.#breaks === 0 ? 1 : this.#holding / this.#weight;
    return { breaks: this.#breaks, weightedShareThatHolds: share };
  }
}
