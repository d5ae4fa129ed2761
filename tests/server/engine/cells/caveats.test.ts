import { expect, test } from "vitest";
import { runElasticities, runSlutsky, runSystem } from "../../../../server/engine/cells/index.ts";
import { elasticitiesSentence } from "../../../../shared/tables/elasticity-words.ts";
import { slutskySentence } from "../../../../shared/tables/sentence.ts";
import { specificationOf, tunaWeeks } from "../../../support/tuna.ts";

const SYSTEM = "data: weeks\nform: la-aids\nimpose: [homogeneity, symmetry]\n";

test("what a system takes as given stands with every matrix and elasticity of it", async () => {
  const data = await tunaWeeks();
  const slutsky = specificationOf("slutsky", "system: base");
  const elasticities = specificationOf("elasticities", "system: base\nat: mean");
  const plain = runSystem(specificationOf("system", SYSTEM), data);
  expect(runSlutsky(slutsky, plain, data)).not.toHaveProperty("caveats");

  const system = runSystem(specificationOf("system", `${SYSTEM}instruments: [week]`), data);
  const matrix = runSlutsky(slutsky, system, data);
  const found = runElasticities(elasticities, system, data);
  const sentence = /The standard errors take the first stage of total expenditure as data\.$/;
  expect(matrix.caveats).toEqual(["first stage as given"]);
  expect(slutskySentence(matrix)).toMatch(sentence);
  expect(elasticitiesSentence(found)).toMatch(sentence);
});
