import type { BootstrapFinding } from "../../schemas/standard-errors.ts";
import { printCount } from "../numbers.ts";
import { citing, type MethodsParts, type Said, said } from "./parts.ts";

/** What the standard errors allow for; counts of clusters and blocks only where the finding holds them. */
export function standardErrorSentences({ specification, data, finding }: MethodsParts): Said[] {
  const asked = specification["standard errors"];
  if (asked === "conventional") return [said("Standard errors are conventional.")];
  if (asked === "heteroskedastic") {
    return [said(`Standard errors are robust to heteroskedasticity ${citing("white1980")}.`, ["white1980"])];
  }
  const count = finding?.clusters?.count;
  if (!("bootstrap" in asked)) {
    const clusters =
      count === undefined ? `clusters of ${asked.cluster}` : `the ${printCount(count)} clusters of ${asked.cluster}`;
    const sentence = `Standard errors allow for correlation within ${clusters} ${citing("liangZeger1986")}.`;
    return [said(sentence, ["liangZeger1986"])];
  }
  const { bootstrap, replicates, seed } = asked;
  const column = asked.cluster ?? data?.cluster;
  const grouped = column === undefined ? "clusters" : `clusters of ${column}`;
  const block = finding?.bootstrap?.block ?? asked.block;
  const drawn: Readonly<Record<BootstrapFinding["of"], string>> = {
    rows: "rows",
    clusters: count === undefined ? grouped : `the ${printCount(count)} ${grouped}`,
    residuals: "residuals",
    blocks: block === undefined ? "moving blocks of periods" : `moving blocks of ${printCount(block)} periods`,
  };
  const source = bootstrap === "blocks" ? ("kunsch1989" as const) : ("efron1979" as const);
  const sentence = `Standard errors come from a bootstrap of ${drawn[bootstrap]} ${citing(source)} with ${printCount(replicates)} replicates (seed ${seed}).`;
  const failed = finding?.bootstrap?.failed ?? 0;
  const without = failed === 1 ? "replicate has" : "replicates have";
  return [said(sentence, [source]), ...(failed > 0 ? [said(`${printCount(failed)} ${without} no estimate.`)] : [])];
}
