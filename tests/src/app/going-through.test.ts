import { expect, it } from "vitest";
import { goingThrough } from "../../../src/app/workspace/going-through.ts";
import type { Standing } from "../../../src/app/workspace/standing.ts";

const cell = (id: string, rest: Partial<Standing>): Standing => ({
  cell: { id, name: `cell ${id}`, kind: "system", order: id, source: "" },
  kind: "system",
  state: "draft",
  problems: [],
  reads: [],
  readBy: [],
  ...rest,
});
const asked = [
  { cellId: "a", aboutMs: 1_000 },
  { cellId: "b", aboutMs: 2_000 },
  { cellId: "c", aboutMs: 1_000 },
];
const running = (step: string, fraction?: number) => ({
  state: "estimating" as const,
  progress: { step, elapsedMs: 500, ...(fraction !== undefined && { fraction }) },
});

it("is one progress over all that were asked for, by the time each takes", () => {
  const standings = [
    cell("a", { state: "current" }),
    cell("b", running("iterating", 0.5)),
    cell("c", running("waiting for survey")),
  ];
  expect(goingThrough(asked, standings)).toEqual({ done: 1, of: 3, now: "cell b", fraction: 0.5, left: ["b", "c"] });
});

it("goes by the time elapsed where a step has no fraction, and never seems finished before it is", () => {
  const going = goingThrough(
    [asked[0]],
    [cell("a", { ...running("iterating"), progress: { step: "iterating", elapsedMs: 9_000 } })],
  );
  expect([going.fraction, going.done]).toEqual([0.95, 0]);
});

it("is behind what has failed, was cancelled or is gone", () => {
  const standings = [cell("a", { state: "failed" }), cell("b", { state: "out of date" })];
  expect(goingThrough(asked, standings)).toEqual({ done: 3, of: 3, fraction: 1, left: [] });
});
