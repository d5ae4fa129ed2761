import { createHash } from "node:crypto";
import { readdirSync } from "node:fs";
import { tmpdir } from "node:os";
import { strFromU8, unzipSync } from "fflate";
import { afterAll, beforeAll, expect, test } from "vitest";
import { uploadChunks, uploads } from "../../../server/db/schema/index.ts";
import { bundleManifest } from "../../../shared/schemas/replication-bundle.ts";
import { type Application, letterTo, startApplication, type Visitor } from "../../support/application.ts";
import { exampleFindings } from "../../support/findings.ts";

let application: Application;
let owner: Visitor;
let coauthor: Visitor;
let reader: Visitor;
let outsider: Visitor;
let studyId: string;

const path = () => `/api/studies/${studyId}/replication-bundles`;
const make = (who: Visitor, data: unknown = "included") => who.ask("POST", path(), { data });

beforeAll(async () => {
  application = await startApplication();
  owner = await application.person("Ilse Marchetti");
  coauthor = await application.person("Tomas Adeyemi");
  reader = await application.person("Petra Vance");
  outsider = await application.person("Nora Lind");
  studyId = (await owner.ask("POST", "/api/studies", { title: "Levy on sweet drinks" })).body.id;
  for (const [who, role] of [
    [coauthor, "coauthor"],
    [reader, "reader"],
  ] as const) {
    await owner.ask("POST", `/api/studies/${studyId}/invitations`, { email: who.email, role });
    await who.ask("POST", `/api/invitations/${(await letterTo(application, who.email)).token}`);
  }
});
afterAll(() => application.close());

test("is made by the study's owner alone", async () => {
  expect((await make(application.stranger)).status).toBe(401);
  expect((await make(owner, "some")).status).toBe(400);
  expect((await make(outsider)).status).toBe(404);
  for (const who of [coauthor, reader]) expect((await make(who)).status).toBe(403);
});

test("needs something current, and the file that it rests on", async () => {
  const none = await make(owner);
  expect([none.status, none.body.error.sentence]).toEqual([
    409,
    "No cell of this study is current, and a bundle holds findings that are.",
  ]);
  const { data, system } = exampleFindings();
  application.cells.put(studyId, { name: "survey", kind: "data", source: "upload: weeks.csv\ngoods: {}\n" }, [], data);
  application.cells.put(
    studyId,
    { name: "base", kind: "system", source: "data: survey\nform: aids\n" },
    ["survey"],
    system,
  );
  const gone = await make(owner);
  expect([gone.status, gone.body.error.sentence]).toEqual([
    409,
    "The file that survey reads is gone; make the bundle again.",
  ]);
});

test("arrives as a zip of its own name, is in the journal for owners, and leaves nothing behind", async () => {
  const { db } = application.open;
  const [now, bytes] = [new Date(), Buffer.from("p1\n1\n2\n")];
  const upload = {
    id: "weeks",
    studyId,
    name: "weeks.csv",
    bytes: bytes.length,
    rows: 2,
    uploadedBy: owner.id,
    uploadedAt: now,
  };
  db.insert(uploads)
    .values({ ...upload, state: "ready", sha256: "0".repeat(64) })
    .run();
  db.insert(uploadChunks).values({ uploadId: "weeks", position: 0, bytes }).run();
  const { status, headers, bytes: zip } = await make(owner);
  expect([status, new TextDecoder().decode(zip).slice(0, 2)]).toEqual([201, "PK"]);
  expect(headers.get("content-type")).toBe("application/zip");
  expect(headers.get("content-disposition")).toBe("attachment; filename=replication-levy-on-sweet-drinks.zip");
  expect(headers.get("cache-control")).toBe("no-store");
  const parts = unzipSync(zip);
  expect(strFromU8(parts["data/weeks.csv"])).toBe("p1\n1\n2\n");
  const { cells, data } = bundleManifest.parse(JSON.parse(strFromU8(parts["bundle.json"])));
  expect(cells.map(({ name }) => name)).toEqual(["survey", "base"]);
  // The file's own, not what was stored of its table.
  expect(data[0]).toMatchObject({ cells: ["survey"], sha256: createHash("sha256").update(bytes).digest("hex") });
  const actions = async (who: Visitor) =>
    (await who.ask("GET", `/api/studies/${studyId}/journal`)).body.entries.map(
      ({ action }: { action: string }) => action,
    );
  expect(await actions(owner)).toContain("replication bundle made");
  expect(await actions(reader)).not.toContain("replication bundle made");
  expect(readdirSync(tmpdir()).filter((name) => name.startsWith("tangency-bundle-"))).toEqual([]);
});

test("is refused while a cell holds the address of one of the study's people", async () => {
  const source = `data: survey\nform: aids # ask ${coauthor.email.toUpperCase()}\n`;
  application.cells.put(studyId, { name: "noted", kind: "system", source }, ["survey"], exampleFindings().system);
  const answer = await make(owner, "withheld");
  expect([answer.status, answer.body.error.sentence]).toEqual([
    409,
    `noted holds the address ${coauthor.email}, which would leave with the bundle: take it out first.`,
  ]);
});
