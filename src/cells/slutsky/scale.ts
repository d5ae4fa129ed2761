import type { MatrixForm } from "../../../shared/tables/slutsky-matrix.ts";

/** Sizes at which an entry's colour deepens, share form. */
const SHARE_STEPS = [0.002, 0.01, 0.03, 0.06, 0.1] as const;

const NEGATIVE = ["n1", "n2", "n3", "n4", "n5"] as const;
const POSITIVE = ["p1", "p2", "p3", "p4", "p5"] as const;
export type ScaleToken = (typeof NEGATIVE)[number] | (typeof POSITIVE)[number] | "z0";

/** From the deepest complement over nought to the deepest substitute: the legend's order. */
export const SCALE_TOKENS: readonly ScaleToken[] = [...NEGATIVE.toReversed(), "z0", ...POSITIVE];

function roundedDown(value: number): number {
  const unit = 10 ** (Math.floor(Math.log10(value)) - 1);
  return Math.floor(value / unit + 1e-9) * unit;
}

/** The five steps: fixed for the share form, in the same proportions to the largest entry for any other. */
export function scaleSteps(form: MatrixForm, entries: readonly (readonly number[])[]): number[] {
  const largest = entries.flat().reduce((most, entry) => Math.max(most, Math.abs(entry)), 0);
  if (form === "share" || largest === 0) return [...SHARE_STEPS];
  return SHARE_STEPS.map((step) => roundedDown((step / SHARE_STEPS[4]) * largest));
}

/** The colour of an entry. Its sign is always printed too. */
export function scaleToken(entry: number, steps: readonly number[]): ScaleToken {
  const passed = steps.filter((step) => Math.abs(entry) >= step).length;
  if (passed === 0) return "z0";
  return (entry < 0 ? NEGATIVE : POSITIVE)[passed - 1];
}

/** Whether text on this colour is set light (dark in the dark theme). */
export function isDeep(token: ScaleToken): boolean {
  return token === "n5" || token === "n4" || token === "p4" || token === "p5";
}
