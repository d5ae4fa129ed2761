import type { ElasticitiesFinding } from "../../../shared/schemas/elasticities.ts";
import { elasticityNotes } from "../../../shared/tables/elasticity-words.ts";
import { Printed } from "../../components/number.tsx";

/** The conventions behind the numbers. */
export function ElasticityNotes({ finding }: { finding: ElasticitiesFinding }) {
  return (
    <p className="type-small max-w-[80ch] text-ink2">
      <Printed text={elasticityNotes(finding).join(" ")} />
    </p>
  );
}
