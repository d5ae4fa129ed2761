import { CELL_KINDS, type CellKind } from "../../../shared/schemas/cell.ts";

const SAYS: Readonly<Record<CellKind, string>> = {
  data: "a file of purchases, and what its columns mean",
  system: "share equations estimated on data",
  tests: "what the data say of theory, and of the system’s own terms",
  elasticities: "elasticities at a point, by group or over rows, with intervals",
  slutsky: "the matrix of compensated effects, checked",
  "price change": "new prices or taxes: effects, welfare, revenue and who bears it",
  figure: "curves, elasticities, fit or shares drawn, with the numbers behind them",
  text: "the argument between the numbers, which it quotes and keeps true",
};

/** The last band: the kinds of cell as words. */
export function AddCellBand({ onAdd }: { onAdd: (kind: CellKind) => void }) {
  return (
    <div className="band no-print">
      <h2 className="verso font-serif text-[1.0625rem]/[1.5rem] text-ink2 italic">Add a cell</h2>
      <ul className="recto flex flex-wrap items-baseline gap-x-6 gap-y-2">
        {CELL_KINDS.map((kind) => (
          <li key={kind}>
            <button
              type="button"
              title={SAYS[kind]}
              className="reference min-h-6 font-serif text-[1.0625rem]/[1.5rem]"
              onClick={() => onAdd(kind)}
            >
              {kind}
            </button>
          </li>
        ))}
      </ul>
    </div>
  );
}
