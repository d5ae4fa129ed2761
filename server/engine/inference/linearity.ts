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
  specification: Pick<
    SystemSpecification,
    "form" | "index" | "differences" | "zeros" | "instruments" | "interactions" | "real expenditure"
  >,
  weighted: boolean,
): Linearity {
  const { form, index = "tornqvist", differences, zeros, instruments } = specification;
  const linearEasi = form === "easi" && specification["real expenditure"] === "approximate";
  if (form !== "la-aids" && form !== "rotterdam" && !linearEasi) {
    return { absent: `Laitinen's test needs equations linear in their coefficients, which those of ${form} are not.` };
  }
  if (zeros !== undefined) {
    return { absent: "Laitinen's test needs the same regressors in every equation; in two steps each has its own." };
  }
  if (linearEasi && specification.interactions?.some((name) => name.startsWith("prices"))) {
    return { absent: "Laitinen's test is of one restriction in each equation; products with prices make it more." };
  }
  if (weighted) return { exact: false, because: "rows weigh differently" };
  if (instruments !== undefined) return { exact: false, because: "the residual of the first stage is estimated" };
  if (form === "rotterdam") {
    // As Laitinen had it in this very system: theory makes the volume independent of the errors.
    return { exact: true, because: "the change in volume is taken as given" };
  }
  if (linearEasi) return { exact: true, because: "mean shares deflate real expenditure" };
  if (differences) return { exact: false, because: "errors in differences are correlated over time" };
  const holds = INDEX_HOLDS[index];
  if (holds) return { exact: false, because: holds };
  return { exact: true, because: `the ${index} index holds no current shares` };
}
