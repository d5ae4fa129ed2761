import { type DataSpecification, dataFinding } from "../../../shared/schemas/data.ts";
import { prepareData } from "../columns/prepare.ts";
import type { PreparedData, UploadTable } from "../columns/prepared-data.ts";
import { QUIET, type RunControl } from "../run.ts";

/** A data cell: the upload's rows cleaned, accounted for and normalised. Errors: `Refusal`. */
export function runData(
  specification: DataSpecification,
  table: UploadTable,
  control: RunControl = QUIET,
): PreparedData {
  const data = prepareData(specification, table, control);
  return { ...data, finding: dataFinding.parse(data.finding) };
}
