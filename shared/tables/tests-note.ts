import type { MadeTest, TestsFinding } from "../schemas/tests.ts";
import { countedRows, listed } from "./phrases.ts";
import { isMade, isRobust } from "./tests.ts";

/** How the tests were made; in full, how each statistic is to be read. */
export function testsNote(finding: TestsFinding, full = false): string[] {
  const made = finding.tests.filter(isMade);
  if (made.length === 0) return [];
  return [
    `All fits by maximum likelihood from ${countedRows(finding.rows)}${finding.weighted ? ", weighted" : ""}; statistics against χ².`,
    ...(isRobust(finding) && finding.covariance ? [robustNote(finding.covariance)] : []),
    ...(full && made.some(({ corrected }) => !("absent" in corrected))
      ? ["The corrected LR is Italianer’s (1985): asymptotic tests reject too often in small samples."]
      : []),
    ...laitinenNotes(made),
    ...givenNote(made),
    ...(full
      ? []
      : finding.tests.flatMap((test) => (isMade(test) || test.because !== "nothing to test" ? [] : [test.reason]))),
  ];
}

type Covariance = NonNullable<TestsFinding["covariance"]>;

function robustNote(covariance: Covariance): string {
  return `Verdicts go by the Wald tests, whose errors are ${errorsText(covariance)}; the others trust errors that are normal, independent and of equal spread.`;
}

/** "clustered by village". */
function errorsText(covariance: Covariance): string {
  if (typeof covariance === "string") return covariance === "heteroskedastic" ? "robust to unequal spread" : covariance;
  if ("cluster" in covariance) return `clustered by ${covariance.cluster}`;
  return `those of a bootstrap of ${covariance.bootstrap}`;
}

function laitinenNotes(made: readonly MadeTest[]): string[] {
  return made.flatMap(({ laitinen }) => {
    if (!laitinen || "absent" in laitinen) return [];
    return [`Laitinen’s (1978) F is ${laitinen.approximate ? "approximate" : "exact"} here: ${laitinen.because}.`];
  });
}

/** What is held besides in the tests of a system's own terms. */
function givenNote(made: readonly MadeTest[]): string[] {
  const own = made.find(({ hypothesis }) => hypothesis === "demographics" || hypothesis === "quadratic terms");
  if (!own || own.given.length === 0) return [];
  const subject = own.hypothesis === "demographics" ? "Demographics are" : "Quadratic terms are";
  return [`${subject} tested with ${listed(own.given)} imposed, as in the system.`];
}
