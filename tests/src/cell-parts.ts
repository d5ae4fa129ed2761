import { FINDING_TABLES } from "../../shared/tables/of-finding.ts";
import { DataBand } from "../../src/cells/data/band.tsx";
import { DataOpen } from "../../src/cells/data/view.tsx";
import { ElasticitiesBand } from "../../src/cells/elasticities/band.tsx";
import { ElasticitiesOpen } from "../../src/cells/elasticities/view.tsx";
import { FigureBand } from "../../src/cells/figure/band.tsx";
import { FigureOpen } from "../../src/cells/figure/view.tsx";
import { PriceChangeBand } from "../../src/cells/price-change/band.tsx";
import { PriceChangeOpen } from "../../src/cells/price-change/view.tsx";
import { SlutskyBand } from "../../src/cells/slutsky/band.tsx";
import { HowChecked } from "../../src/cells/slutsky/how-checked.tsx";
import { SlutskyOpen } from "../../src/cells/slutsky/view.tsx";
import { SystemBand } from "../../src/cells/system/band.tsx";
import { SystemOpen } from "../../src/cells/system/view.tsx";
import { TestsBand } from "../../src/cells/tests/band.tsx";
import { TestsOpen } from "../../src/cells/tests/view.tsx";
import { TextBand } from "../../src/cells/text/band.tsx";
import { TextOpen } from "../../src/cells/text/view.tsx";

/** The parts of each kind that show a finding, here without loading them one by one. */
export const CELL_PARTS = {
  data: { Band: DataBand, Open: DataOpen, tables: FINDING_TABLES.data },
  system: { Band: SystemBand, Open: SystemOpen, tables: FINDING_TABLES.system },
  tests: { Band: TestsBand, Open: TestsOpen, tables: FINDING_TABLES.tests },
  elasticities: { Band: ElasticitiesBand, Open: ElasticitiesOpen, tables: FINDING_TABLES.elasticities },
  slutsky: { Band: SlutskyBand, Open: SlutskyOpen, Aside: HowChecked, tables: FINDING_TABLES.slutsky },
  "price change": { Band: PriceChangeBand, Open: PriceChangeOpen, tables: FINDING_TABLES["price change"] },
  figure: { Band: FigureBand, Open: FigureOpen, tables: FINDING_TABLES.figure },
  text: { Band: TextBand, Open: TextOpen, tables: FINDING_TABLES.text },
};
