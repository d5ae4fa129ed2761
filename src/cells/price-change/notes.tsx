import type { PriceChangeFinding } from "../../../shared/schemas/price-change.ts";
import { priceChangeNotes, WELFARE_CAUTION, warningsOf } from "../../../shared/tables/price-change-words.ts";
import { Printed } from "../../components/number.tsx";

/** Conventions of the figures; the cautions stand above them. */
export function PriceChangeNotes({ finding }: { finding: PriceChangeFinding }) {
  const said = [WELFARE_CAUTION, ...warningsOf(finding)];
  const notes = priceChangeNotes(finding).filter((note) => !said.includes(note));
  return (
    <p className="type-small max-w-[80ch] text-ink2">
      <Printed text={notes.join(" ")} />
    </p>
  );
}
