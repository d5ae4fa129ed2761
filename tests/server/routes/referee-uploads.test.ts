import { afterAll, beforeAll, expect, test } from "vitest";
import { refereeCopy } from "../../../shared/schemas/referee-copy.ts";
import { verifyCopy } from "../../../src/workers/verify-copy.ts";
import { type Application, startApplication, type Visitor } from "../../support/application.ts";
import { sampleData, sampleSlutsky, sampleSystem } from "../../support/sample-findings.ts";

let application: Application;
let owner: Visitor;
let studyId: string;

beforeAll(async () => {
  application = await startApplication();
  owner = await application.person("Ilse Marchetti");
  studyId = (await owner.ask("POST", "/api/studies", { title: "Levy on sweet drinks" })).body.id;
});
afterAll(() => application.close());

async function bring(text: string): Promise<{ id: string; version: number }> {
  const form = new FormData();
  form.append("file", new Blob([text]), "weeks.csv");
  return (await owner.ask("POST", `/api/studies/${studyId}/uploads`, form)).body;
}

test("a sealed copy opens and verifies as before once the version of the upload it rests on is removed", async () => {
  const old = await bring("p1\n1\n");
  application.cells.put(studyId, { name: "survey", kind: "data", source: "upload: weeks.csv" }, [], sampleData());
  application.cells.put(studyId, { name: "base", kind: "system", source: "data: survey" }, ["survey"], sampleSystem());
  const matrix = { name: "matrix", kind: "slutsky", source: "system: base\nat: base point" };
  const { cellId } = application.cells.put(studyId, matrix, ["base"], sampleSlutsky());
  const sealed = await owner.ask("POST", `/api/studies/${studyId}/referee-copies`, { cellId });
  const open = async () => (await application.stranger.ask("GET", `/api/referee/${sealed.body.token}`)).body;
  const before = await open();

  // The newer version is what the cell reads from here on; the older may go, and with it all that was kept of its rows.
  const now = await bring("p1\n2\n");
  expect([old.version, now.version]).toEqual([1, 2]);
  expect((await owner.ask("DELETE", `/api/studies/${studyId}/uploads/${old.id}`)).status).toBe(204);
  const left = (await owner.ask("GET", `/api/studies/${studyId}/uploads`)).body;
  expect(left.map(({ version }: { version: number }) => version)).toEqual([2]);

  const after = refereeCopy.parse(await open());
  expect(after).toEqual(before);
  const verification = verifyCopy(after, () => 0);
  expect(verification).toMatchObject({ fingerprintAgrees: true, fingerprint: before.fingerprint, largest: 0 });
  expect(verification.comparison.verdictsAgree).toBe(true);
});
