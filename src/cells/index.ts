import type { CellKind, FindingOf } from "../../shared/schemas/cell.ts";
import { coefficientTable } from "../../shared/tables/coefficients.ts";
import { dataDescriptionTable } from "../../shared/tables/data-description.ts";
import { eigenvalueTable } from "../../shared/tables/eigenvalues.ts";
import { elasticityTables } from "../../shared/tables/elasticities.ts";
import { equationsOf, equationTestsTable } from "../../shared/tables/equation-tests.ts";
import { firstStepTables } from "../../shared/tables/first-steps.ts";
import { revealedOf, revealedTable } from "../../shared/tables/revealed-preference.ts";
import { rowAccountingTable } from "../../shared/tables/row-accounting.ts";
import { compensatedTable, slutskyTable } from "../../shared/tables/slutsky-matrix.ts";
import type { LabelledTable } from "../../shared/tables/table.ts";
import { testsTable } from "../../shared/tables/tests.ts";
import { DataForm } from "./data/form.tsx";
import { DataBand, DataOpen } from "./data/view.tsx";
import { ElasticitiesForm } from "./elasticities/form.tsx";
import { ElasticitiesBand, ElasticitiesOpen } from "./elasticities/view.tsx";
import { SlutskyForm } from "./slutsky/form.tsx";
import { HowChecked } from "./slutsky/how-checked.tsx";
import { SlutskyBand, SlutskyOpen } from "./slutsky/view.tsx";
import { SystemForm } from "./system/form.tsx";
import { SystemBand, SystemOpen } from "./system/view.tsx";
import { TestsForm } from "./tests/form.tsx";
import { TestsBand, TestsOpen } from "./tests/view.tsx";
import type { CellView } from "./types.ts";

/** What each kind of cell shows; a kind is added here with its folder. */
export const CELL_VIEWS: { readonly [K in CellKind]: CellView<K> } = {
  data: {
    Form: DataForm,
    Band: DataBand,
    Open: DataOpen,
    tables: (finding) => [dataDescriptionTable(finding), rowAccountingTable(finding.accounting)],
  },
  system: {
    Form: SystemForm,
    Band: SystemBand,
    Open: SystemOpen,
    tables: (finding) => [coefficientTable(finding), ...firstStepTables(finding)],
  },
  tests: {
    Form: TestsForm,
    Band: TestsBand,
    Open: TestsOpen,
    tables: testsTables,
  },
  elasticities: {
    Form: ElasticitiesForm,
    Band: ElasticitiesBand,
    Open: ElasticitiesOpen,
    tables: elasticityTables,
  },
  slutsky: {
    Form: SlutskyForm,
    Band: SlutskyBand,
    Open: SlutskyOpen,
    Aside: HowChecked,
    tables: (finding) => [slutskyTable(finding, finding.form), eigenvalueTable(finding), compensatedTable(finding)],
  },
};

function testsTables(finding: FindingOf<"tests">): LabelledTable[] {
  const revealed = revealedOf(finding);
  return [
    ...(finding.tests.length > 0 ? [testsTable(finding)] : []),
    ...(equationsOf(finding).length > 0 ? [equationTestsTable(finding)] : []),
    ...(revealed ? [revealedTable(revealed)] : []),
  ];
}
