import type { Problem } from "../../schemas/problem.ts";
import type { SystemSpecification } from "../../schemas/system.ts";
import type { KeyPath } from "../cell-source.ts";
import { uploadRead } from "../uploads.ts";
import { type Context, MOST_TOLD, noColumn, noGood, teller } from "./tell.ts";

/** Columns of numbers and of clusters, and the dropped good. */
export function systemProblems(specification: SystemSpecification, context: Context): Problem[] {
  const tell = teller(context.places);
  const data = context.specifications.get(specification.data);
  if (data?.kind !== "data") return [];
  const problems: Problem[] = [];
  const upload = uploadRead(context.uploads, data);
  if (upload) {
    const numeric = upload.columns.filter(({ type }) => type === "number").map(({ name }) => name);
    const names = [...numeric, ...Object.keys(data.derive ?? {})];
    const known = new Set(names);
    for (const [path, column] of numbersNamed(specification)) {
      if (known.has(column) || problems.length >= MOST_TOLD) continue;
      const isText = upload.columns.some(({ name, type }) => name === column && type === "text");
      const text = `${column} of ${specification.data} is a text column; ${path[0]} need numbers: derive one, such as ${column} == "…".`;
      problems.push(tell(path, ...(isText ? ([text] as [string]) : noColumn(specification.data, column, names))));
    }
    const cluster = clusterNamed(specification);
    const all = [...upload.columns.map(({ name }) => name), ...Object.keys(data.derive ?? {})];
    if (cluster !== undefined && !all.includes(cluster)) {
      problems.push(tell(["standard errors", "cluster"], ...noColumn(specification.data, cluster, all)));
    }
  }
  const goods = Object.keys(data.goods);
  if (specification.dropped !== undefined && !goods.includes(specification.dropped)) {
    problems.push(tell(["dropped"], ...noGood(specification.data, specification.dropped, goods)));
  }
  return problems;
}

/** The columns of numbers a system names, each with its place. */
function numbersNamed({ demographics, instruments = [], zeros }: SystemSpecification): [KeyPath, string][] {
  const participation = zeros === undefined || zeros === "two-step" ? [] : zeros["two-step"];
  return [
    ...demographics.map((column, i): [KeyPath, string] => [["demographics", i], column]),
    ...instruments.map((column, i): [KeyPath, string] => [["instruments", i], column]),
    ...participation.map((column, i): [KeyPath, string] => [["zeros", "two-step", i], column]),
  ];
}

/** The column of `cluster`, beside clustered standard errors or a bootstrap of clusters. */
function clusterNamed({ "standard errors": errors }: SystemSpecification): string | undefined {
  return typeof errors === "string" ? undefined : errors.cluster;
}
