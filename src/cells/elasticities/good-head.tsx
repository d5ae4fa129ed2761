import type { ElasticitiesFinding, ElasticityGroup } from "../../../shared/schemas/elasticities.ts";
import { capital } from "../../../shared/study/words.ts";
import { AnchorMark } from "../../components/anchor-mark.tsx";

interface GoodHeadProps {
  readonly finding: ElasticitiesFinding;
  readonly group: ElasticityGroup;
  readonly good: string;
  /** Which of the tables of a group, where that is not the first. */
  readonly table?: string;
}

/** The head of a good's line, which can be spoken of: "row Grains, lowest fifth, compensated". */
export function GoodHead({ finding, group, good, table }: GoodHeadProps) {
  const words = [capital(good), ...(finding.groups.length > 1 ? [group.name] : []), ...(table ? [table] : [])];
  return (
    <>
      {capital(good)}
      <AnchorMark of={`row ${words.join(", ")}`} />
    </>
  );
}
