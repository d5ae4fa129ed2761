/** "conditional on food expenditure": of a system whose total is what is spent on one group. */
export function conditionalWords({ conditionalOn }: { readonly conditionalOn?: string }): string {
  return conditionalOn === undefined ? "" : `conditional on ${conditionalOn} expenditure`;
}

/** The same behind a heading, a title or what a number is: ", conditional on food expenditure"; nothing of a whole budget. */
export function conditionally(finding: { readonly conditionalOn?: string }): string {
  const words = conditionalWords(finding);
  return words && `, ${words}`;
}
