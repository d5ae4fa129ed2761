import type { CellKind } from "../../shared/schemas/cell.ts";
import type { CellView } from "./types.ts";

/** What each kind of cell shows; a kind is added here with its folder, and its tables in `shared/tables/of-finding.ts`. */
export const CELL_VIEWS: { readonly [K in CellKind]: CellView<K> } = {
  data: {
    Band: async () => (await import("./data/band.tsx")).DataBand,
    Open: async () => (await import("./data/view.tsx")).DataOpen,
    Form: async () => (await import("./data/form.tsx")).DataForm,
    tables: async () => (await import("../../shared/tables/of-finding.ts")).FINDING_TABLES.data,
  },
  system: {
    Band: async () => (await import("./system/band.tsx")).SystemBand,
    Open: async () => (await import("./system/view.tsx")).SystemOpen,
    Form: async () => (await import("./system/form.tsx")).SystemForm,
    tables: async () => (await import("../../shared/tables/of-finding.ts")).FINDING_TABLES.system,
  },
  tests: {
    Band: async () => (await import("./tests/band.tsx")).TestsBand,
    Open: async () => (await import("./tests/view.tsx")).TestsOpen,
    Form: async () => (await import("./tests/form.tsx")).TestsForm,
    tables: async () => (await import("../../shared/tables/of-finding.ts")).FINDING_TABLES.tests,
  },
  elasticities: {
    Band: async () => (await import("./elasticities/band.tsx")).ElasticitiesBand,
    Open: async () => (await import("./elasticities/view.tsx")).ElasticitiesOpen,
    Form: async () => (await import("./elasticities/form.tsx")).ElasticitiesForm,
    tables: async () => (await import("../../shared/tables/of-finding.ts")).FINDING_TABLES.elasticities,
  },
  slutsky: {
    Band: async () => (await import("./slutsky/band.tsx")).SlutskyBand,
    Open: async () => (await import("./slutsky/view.tsx")).SlutskyOpen,
    Form: async () => (await import("./slutsky/form.tsx")).SlutskyForm,
    Aside: async () => (await import("./slutsky/how-checked.tsx")).HowChecked,
    tables: async () => (await import("../../shared/tables/of-finding.ts")).FINDING_TABLES.slutsky,
  },
  "price change": {
    Band: async () => (await import("./price-change/band.tsx")).PriceChangeBand,
    Open: async () => (await import("./price-change/view.tsx")).PriceChangeOpen,
    Form: async () => (await import("./price-change/form.tsx")).PriceChangeForm,
    Controls: async () => (await import("./price-change/controls.tsx")).PriceRulers,
    tables: async () => (await import("../../shared/tables/of-finding.ts")).FINDING_TABLES["price change"],
  },
  figure: {
    Band: async () => (await import("./figure/band.tsx")).FigureBand,
    Open: async () => (await import("./figure/view.tsx")).FigureOpen,
    Form: async () => (await import("./figure/form.tsx")).FigureForm,
    tables: async () => (await import("../../shared/tables/of-finding.ts")).FINDING_TABLES.figure,
  },
  text: {
    Band: async () => (await import("./text/band.tsx")).TextBand,
    Open: async () => (await import("./text/view.tsx")).TextOpen,
    tables: async () => (await import("../../shared/tables/of-finding.ts")).FINDING_TABLES.text,
  },
};
