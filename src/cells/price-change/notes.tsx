import type { PriceChangeFinding } from "../../../shared/schemas/price-change.ts";
import { priceChangeNotes } from "../../../shared/tables/price-change-words.ts";
import { Printed } from "../../components/number.tsx";

/** Cautions and conventions beside the figures. */
export function PriceChangeNotes({ finding }: { finding: PriceChangeFinding }) {
  return (
    <p className="type-small max-w-[80ch] text-ink2">
      <Printed text={priceChangeNotes(finding).join(" ")} />
    </p>
  );
}
