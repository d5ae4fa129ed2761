import type { PriceChangeFinding } from "../../../shared/schemas/price-change.ts";
import { priceChangeNotes, WELFARE_CAUTION, warningsOf } from "../../../shared/tables/price-change-words.ts";
import { Printed } from "../../components/number.tsx";

interface NotesProps {
  readonly finding: PriceChangeFinding;
  /** Cautions stand above already: conventions alone. */
  readonly afterCare?: boolean;
}

/** Cautions and conventions beside the figures. */
export function PriceChangeNotes({ finding, afterCare = false }: NotesProps) {
  const said = afterCare ? [WELFARE_CAUTION, ...warningsOf(finding)] : [];
  const notes = priceChangeNotes(finding).filter((note) => !said.includes(note));
  return (
    <p className="type-small max-w-[80ch] text-ink2">
      <Printed text={notes.join(" ")} />
    </p>
  );
}
