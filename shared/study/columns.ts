import type { Problem } from "../schemas/problem.ts";
import { dataProblems } from "./columns/of-data.ts";
import { elasticitiesProblems } from "./columns/of-elasticities.ts";
import { figureProblems } from "./columns/of-figure.ts";
import { priceChangeProblems } from "./columns/of-price-change.ts";
import { priceProblems } from "./columns/of-prices.ts";
import { systemProblems } from "./columns/of-system.ts";
import type { Context } from "./columns/tell.ts";

export type { UploadShape } from "./columns/upload-shape.ts";

/** Columns and goods a specification names that are not there, each with the nearest that is. */
export function columnProblems(context: Context): Problem[] {
  const { specification } = context;
  if (specification.kind === "data") return dataProblems(specification, context);
  if (specification.kind === "system") return systemProblems(specification, context);
  if (specification.kind === "slutsky") return priceProblems(specification.at, specification.system, context);
  if (specification.kind === "price change") return priceChangeProblems(specification, context);
  if (specification.kind === "figure") return figureProblems(specification, context);
  return specification.kind === "elasticities" ? elasticitiesProblems(specification, context) : [];
}
