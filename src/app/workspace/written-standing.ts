import type { Standing } from "./standing.ts";

/** Where a text cell stands: nothing is found for it, so that it is as current as the cells it quotes are here. */
export function writtenStanding(standing: Standing, all: readonly Standing[]): Standing {
  const { fingerprint: _, because: __, ...own } = standing;
  if (own.problems.length > 0) return { ...own, state: "failed", because: "in what it quotes" };
  if (own.cell.source.trim() === "") return { ...own, state: "draft", because: "nothing is written yet" };
  const isBehind = own.reads.some((name) => all.find(({ cell }) => cell.name === name)?.state !== "current");
  return { ...own, state: isBehind ? "out of date" : "current" };
}
