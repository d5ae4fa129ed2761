import type { FormulaParts } from "../../../shared/economics/formula.ts";
import { DECIMALS, printFixed } from "../../../shared/tables/numbers.ts";

const MOST_DECIMALS = 9;

/** The decimals a reader must be shown for the printed numbers to add up to the printed entry. */
export function formulaDecimals(parts: FormulaParts): number {
  const target = printFixed(parts.value, DECIMALS.entry);
  for (let decimals: number = DECIMALS.entry; decimals < MOST_DECIMALS; decimals++) {
    const rounded = (value: number) => Number(value.toFixed(decimals));
    const outside = rounded(parts.priceSlope) - (parts.own ? rounded(parts.share) : 0);
    const factored = outside + (rounded(parts.share) + rounded(parts.totalSlope)) * rounded(parts.otherShare);
    const added = outside + rounded(parts.incomeTerm);
    if (printFixed(factored, DECIMALS.entry) === target && printFixed(added, DECIMALS.entry) === target)
      return decimals;
  }
  return MOST_DECIMALS;
}

/** A number that follows another: "+ 0.01" or "− 0.01". */
export function added(value: number, decimals: number): string {
  const size = printFixed(Math.abs(value), decimals);
  return value < 0 ? `\u2212 ${size}` : `+ ${size}`;
}
