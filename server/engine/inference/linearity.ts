import type { SystemSpecification } from "../../../shared/schemas/system.ts";

/** Whether Laitinen's test has its distribution exactly, and why; or why it does not apply. */
export type Linearity = { readonly exact: boolean; readonly because: string } | { readonly absent: string };

const INDEX_HOLDS: Readonly<Record<string, string>> = {
  tornqvist: "the Törnqvist index holds current shares",
  stone: "Stone's index holds current shares",
  paasche: "the Paasche index holds current shares",
  "lagged stone": "the lagged index holds shares of the period before",
};

/**
 * Laitinen (1978) needs share equations linear in their coefficients, each with the same regressors, normal errors,
 * and nothing on the right that depends on current shares.
 */
export function linearityOf(
  { form, index = "tornqvist", differences }: Pick<SystemSpecification, "form" | "index" | "differences">,
  weighted: boolean,
): Linearity {
  if (form === "rotterdam") return { exact: false, because: "the change in real total holds current shares" };
  if (form !== "la-aids") {
    return { absent: `Laitinen's test needs equations linear in their coefficients, which those of ${form} are not.` };
  }
  if (weighted) return { exact: false, because: "rows weigh differently" };
  if (differences) return { exact: false, because: "errors in differences are correlated over time" };
  const holds = INDEX_HOLDS[index];
  if (holds) return { exact: false, because: holds };
  return { exact: true, because: `the ${index} index holds no current shares` };
}
