import type { DataSpecification } from "../../schemas/data.ts";
import type { ElasticitiesSpecification } from "../../schemas/elasticities.ts";
import type { Problem } from "../../schemas/problem.ts";
import { uploadRead } from "../uploads.ts";
import { type Context, noColumn, teller } from "./tell.ts";

/** Groups by a column that is not there; `others` are what else may be named in its place. */
export function groupProblems(
  groups: ElasticitiesSpecification["groups"],
  data: DataSpecification,
  context: Context,
  others: readonly string[],
): Problem[] {
  const upload = uploadRead(context.uploads, data);
  if (groups === undefined || upload === undefined || others.includes(groups.of)) return [];
  const tell = teller(context.places);
  const problems: Problem[] = [];
  const column = upload.columns.find((one) => one.name === groups.of);
  const derived = Object.keys(data.derive ?? {});
  const names = [...upload.columns.map((one) => one.name), ...derived, ...others];
  if (!names.includes(groups.of)) problems.push(tell(["groups", "of"], ...noColumn(data.upload, groups.of, names)));
  if (groups.quantiles !== undefined && column?.type === "text" && !derived.includes(groups.of)) {
    problems.push(tell(["groups", "quantiles"], `${groups.of} is a text column and has no quantiles.`));
  }
  return problems;
}
