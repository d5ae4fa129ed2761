import { beforeAll, describe, expect, test } from "vitest";
import { runPriceChange, runSystem } from "../../server/engine/cells/index.ts";
import type { PreparedData } from "../../server/engine/columns/prepared-data.ts";
import type { PriceAnswer } from "../../shared/economics/price-change/answer-at.ts";
import type { PriceChangeFinding } from "../../shared/schemas/price-change.ts";
import type { SystemFinding } from "../../shared/schemas/system.ts";
import { replyTo } from "../../src/workers/answer.ts";
import { specificationOf, tunaWeeks } from "../support/tuna.ts";

/** Browser against server: what a ruler shows is the stored answer to the same question, to the last digit. */
const BOTH = "impose: [homogeneity, symmetry]";
const SYSTEMS = {
  aids: `form: aids\n${BOTH}`,
  "aids without symmetry": "form: aids",
  quaids: `form: quaids\n${BOTH}`,
  "la-aids": `form: la-aids\n${BOTH}`,
  les: "form: les",
  easi: `form: easi\n${BOTH}`,
  rotterdam: `form: rotterdam\n${BOTH}`,
} as const;
const QUESTIONS = [
  "prices: {}",
  "prices: {brand1: {per cent: 30}}",
  "prices: {brand1: {ad valorem: 20, pass-through: 0.8}, brand3: {specific: 0.2}, brand4: {to: 1}}\nexpenditure: -3",
] as const;

let data: PreparedData;
beforeAll(async () => {
  data = await tunaWeeks("time: week");
});

/** By the worker's own door, everything passed as a worker passes it: by copy. */
function inTheBrowser(finding: PriceChangeFinding): PriceAnswer {
  const { fitted, point, pointName, priceScale, totalScale, level, priceRange, question } = finding;
  const ask = { fitted, point, pointName, priceScale, totalScale, level, priceRange, question };
  const reply = structuredClone(replyTo(structuredClone({ id: 1, kind: "prices", ask })));
  if ("refusal" in reply) throw new Error(reply.refusal);
  return reply.answer as PriceAnswer;
}

describe.each(Object.entries(SYSTEMS))("%s", (_, keys) => {
  let system: SystemFinding;
  beforeAll(() => {
    system = runSystem(specificationOf("system", `data: d\n${keys}\n`), data);
  });

  test.each(QUESTIONS)("%s", (question) => {
    const finding = runPriceChange(specificationOf("price change", `system: s\n${question}\n`), system, data);
    const { at, unseen, checks } = finding;
    expect(inTheBrowser(finding)).toEqual({ at, unseen, checks });
  });
});
