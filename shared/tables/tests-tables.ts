import type { TestsFinding } from "../schemas/tests.ts";
import { equationsOf, equationTestsTable } from "./equation-tests.ts";
import { revealedOf, revealedTable } from "./revealed-preference.ts";
import type { LabelledTable } from "./table.ts";
import { testsTable } from "./tests.ts";

/** Every table of a tests cell: the statistics, homogeneity equation by equation, revealed preference. */
export function testsTables(finding: TestsFinding): LabelledTable[] {
  const revealed = revealedOf(finding);
  return [
    ...(finding.tests.length > 0 ? [testsTable(finding)] : []),
    ...(equationsOf(finding).length > 0 ? [equationTestsTable(finding)] : []),
    ...(revealed ? [revealedTable(revealed)] : []),
  ];
}
