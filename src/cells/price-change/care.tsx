import type { PriceChangeFinding } from "../../../shared/schemas/price-change.ts";
import { WELFARE_CAUTION, warningsOf } from "../../../shared/tables/price-change-words.ts";
import { Printed } from "../../components/number.tsx";

/** Ruled off and said before any figure of welfare or tax: for whom, how sure, and what these prices in particular ask for. */
export function ReadWithCare({ finding }: { finding: PriceChangeFinding }) {
  return (
    <section
      aria-label="Read with care"
      className="border-stale border-y py-2 text-[0.875rem]/[1.25rem] min-[600px]:flex min-[600px]:gap-x-4"
    >
      <strong className="shrink-0 font-semibold text-stale">Read with care</strong>
      <ul className="max-w-[96ch] space-y-1">
        {[WELFARE_CAUTION, ...warningsOf(finding)].map((sentence) => (
          <li key={sentence}>
            <Printed text={sentence} />
          </li>
        ))}
      </ul>
    </section>
  );
}
