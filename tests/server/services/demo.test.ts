import { afterAll, beforeAll, expect, test } from "vitest";
import { changeStudy, deleteStudy } from "../../../server/db/queries/studies.ts";
import { closeDemoAccounts, demoSignIns, isDemo, openDemoAccounts } from "../../../server/demo/accounts.ts";
import { type DemoStudy, needsDemoStudy, seedDemoStudy } from "../../../server/demo/seed.ts";
import { type Application, startApplication } from "../../support/application.ts";
import { exampleFindings } from "../../support/findings.ts";

const DEMO: DemoStudy = {
  title: "Levy on sweet drinks",
  lede: "Household purchases",
  upload: { name: "purchases.csv", csv: "p1\n1\n2\n" },
  cells: [
    { name: "survey", kind: "data", source: "upload: purchases.csv" },
    { name: "base", kind: "system", source: "data: survey" },
  ],
};

let application: Application;
beforeAll(async () => {
  application = await startApplication();
});
afterAll(() => application.close());

const signIn = async (email: string, password: string) =>
  (await application.stranger.ask("POST", "/api/auth/sign-in/email", { email, password })).status;
const hasCells = (studyId: string) => application.cells.sourcesOf(studyId).length > 0;

async function seed(): Promise<string[]> {
  const said: string[] = [];
  const { open, auth, services, cells } = application;
  await seedDemoStudy(DEMO, await openDemoAccounts(auth, open.db), {
    db: open.db,
    services,
    write: async (studyId, wanted) => {
      for (const cell of wanted) cells.put(studyId, cell, [], exampleFindings().data);
    },
    say: (line) => said.push(line),
  });
  return said;
}

test("a new installation is a demo, unless the environment says otherwise", () => {
  const { db } = application.open;
  expect([isDemo(db, undefined), isDemo(db, false), needsDemoStudy(db, hasCells)]).toEqual([true, false, true]);
});

test("its three people sign in, each in their role, to one study with its upload and cells", async () => {
  expect(await seed()).toEqual(["Making the demo study: reading purchases.csv.", "  survey: found", "  base: found"]);
  for (const { email, passphrase } of demoSignIns()) expect(await signIn(email, passphrase)).toBe(200);
  const people = application.services.people.list({ id: ownerId() }, "demo");
  expect(people.map(({ email, role }) => ({ email, role }))).toEqual(
    demoSignIns().map(({ email, role }) => ({ email, role })),
  );
  const [remark] = await application.services.remarks.list({ id: ownerId() }, "demo");
  expect(remark).toMatchObject({ cellName: "base", author: { name: "Tomás Adeyemi" } });
  expect(remark.replies.map(({ author }) => author.name)).toEqual(["Ilse Marchetti"]);
  expect(application.services.uploads.list({ id: ownerId() }, "demo")).toHaveLength(1);
  expect(application.cells.calls).toContain(`bring up to date demo ${ownerId()}`);
});

test("is not made twice, is made anew when its making was cut short, and stays a demo", async () => {
  const { db } = application.open;
  expect([needsDemoStudy(db, hasCells), isDemo(db, undefined)]).toEqual([false, true]);
  expect(needsDemoStudy(db, () => false)).toBe(true);
  changeStudy(db, "demo", { title: "cut short" });
  await seed();
  const { study } = await application.services.studies.read({ id: ownerId() }, "demo");
  expect(study.title).toBe(DEMO.title);
});

test("is not made again for those who put it away but have other studies", async () => {
  const { db } = application.open;
  await application.services.studies.create({ id: ownerId() }, { title: "Mine", lede: "" });
  deleteStudy(db, "demo");
  expect(needsDemoStudy(db, () => false)).toBe(false);
});

test("outside demo mode nobody gets in by the passphrase that everyone knows", async () => {
  const { email, passphrase } = demoSignIns()[0];
  const person = await application.stranger.ask("POST", "/api/auth/sign-in/email", { email, password: passphrase });
  const cookie = person.headers.getSetCookie()[0].split(";")[0];
  closeDemoAccounts(application.open.db);
  expect(await signIn(email, passphrase)).toBe(401);
  expect((await application.stranger.ask("GET", "/api/me", undefined, { cookie })).status).toBe(401);
  // Started again without a word about the demo, it stays closed.
  expect(isDemo(application.open.db, undefined)).toBe(false);
  await openDemoAccounts(application.auth, application.open.db);
  expect(await signIn(email, passphrase)).toBe(200);
});

let known = "";
function ownerId(): string {
  known ||= application.open.sqlite
    .prepare("select id from user where email = ?")
    .pluck()
    .get(demoSignIns()[0].email) as string;
  return known;
}
