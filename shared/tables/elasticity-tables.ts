import type { ElasticitiesFinding } from "../schemas/elasticities.ts";
import { oneStageTables } from "./elasticities.ts";
import type { LabelledTable } from "./table.ts";
import { isTwoStage, twoStageTables } from "./two-stage.ts";

/** The finding's tables, the one to copy first. */
export function elasticityTables(finding: ElasticitiesFinding): LabelledTable[] {
  return isTwoStage(finding) ? twoStageTables(finding) : oneStageTables(finding);
}
