import type { CellKind, FindingOf } from "../schemas/cell.ts";
import { coefficientTable } from "./coefficients.ts";
import { dataDescriptionTable } from "./data-description.ts";
import { eigenvalueTable } from "./eigenvalues.ts";
import { elasticityTables } from "./elasticity-tables.ts";
import { figureTables } from "./figure.ts";
import { firstStepTables } from "./first-steps.ts";
import { priceChangeTables } from "./price-change.ts";
import { rowAccountingTable } from "./row-accounting.ts";
import { compensatedTable, slutskyTable } from "./slutsky-matrix.ts";
import type { LabelledTable } from "./table.ts";
import { testsTables } from "./tests-tables.ts";
import { quotedNumbersTable } from "./text-finding.ts";

/** The tables of a finding of each kind, the one to copy first. */
export const FINDING_TABLES: { readonly [K in CellKind]: (finding: FindingOf<K>) => LabelledTable[] } = {
  data: (finding) => [dataDescriptionTable(finding), rowAccountingTable(finding.accounting)],
  system: (finding) => [coefficientTable(finding), ...firstStepTables(finding)],
  tests: testsTables,
  elasticities: elasticityTables,
  slutsky: (finding) => [slutskyTable(finding, finding.form), eigenvalueTable(finding), compensatedTable(finding)],
  "price change": priceChangeTables,
  figure: figureTables,
  text: (finding) => [quotedNumbersTable(finding)],
};
