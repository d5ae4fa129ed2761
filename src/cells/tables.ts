import type { CellKind, FindingOf } from "../../shared/schemas/cell.ts";
import { coefficientTable } from "../../shared/tables/coefficients.ts";
import { dataDescriptionTable } from "../../shared/tables/data-description.ts";
import { eigenvalueTable } from "../../shared/tables/eigenvalues.ts";
import { elasticityTables } from "../../shared/tables/elasticities.ts";
import { firstStepTables } from "../../shared/tables/first-steps.ts";
import { rowAccountingTable } from "../../shared/tables/row-accounting.ts";
import { compensatedTable, slutskyTable } from "../../shared/tables/slutsky-matrix.ts";
import type { LabelledTable } from "../../shared/tables/table.ts";
import { testsTables } from "../../shared/tables/tests-tables.ts";
import { quotedNumbersTable } from "../../shared/tables/text-finding.ts";

/** The tables of a finding of each kind, the one to copy first. */
export const CELL_TABLES: { readonly [K in CellKind]: (finding: FindingOf<K>) => LabelledTable[] } = {
  data: (finding) => [dataDescriptionTable(finding), rowAccountingTable(finding.accounting)],
  system: (finding) => [coefficientTable(finding), ...firstStepTables(finding)],
  tests: testsTables,
  elasticities: elasticityTables,
  slutsky: (finding) => [slutskyTable(finding, finding.form), eigenvalueTable(finding), compensatedTable(finding)],
  text: (finding) => [quotedNumbersTable(finding)],
};
