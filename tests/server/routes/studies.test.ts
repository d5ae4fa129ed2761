import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { person, studySummary } from "../../../shared/schemas/resources.ts";
import { type Application, letterTo, startApplication, type Visitor } from "../../support/application.ts";

let application: Application;
let owner: Visitor;
let other: Visitor;
let studyId: string;

beforeAll(async () => {
  application = await startApplication();
  owner = await application.person("Ilse Marchetti");
  other = await application.person("Tomas Adeyemi");
  studyId = (await owner.ask("POST", "/api/studies", { title: " Levy ", lede: "Sweet drinks" })).body.id;
});
afterAll(() => application.close());

/** The other one is invited, and accepts. */
async function join(role: string): Promise<void> {
  await owner.ask("POST", study("/invitations"), { email: other.email, role });
  const { token } = await letterTo(application, other.email);
  expect((await other.ask("POST", `/api/invitations/${token}`)).status).toBe(200);
}

const study = (rest = "") => `/api/studies/${studyId}${rest}`;

describe("studies", () => {
  test("a new one has its maker as owner and is in their list only", async () => {
    const [mine] = (await owner.ask("GET", "/api/studies")).body;
    expect(studySummary.parse(mine)).toMatchObject({ id: studyId, title: "Levy", lede: "Sweet drinks", role: "owner" });
    expect(mine.people).toEqual([{ id: owner.id, name: owner.name, email: owner.email, role: "owner" }]);
    expect((await other.ask("GET", "/api/studies")).body).toEqual([]);
  });

  test("the list shows each cell's state and what it reads", async () => {
    application.cells.put(studyId, { name: "survey", kind: "data", source: "" }, []);
    const [mine] = (await owner.ask("GET", "/api/studies")).body;
    expect(mine.cells).toEqual([{ name: "survey", state: "draft", reads: [] }]);
  });

  test("a change is kept and moves the study to the head of the list", async () => {
    await owner.ask("POST", "/api/studies", { title: "Another" });
    const changed = await owner.ask("PATCH", study(), { title: "Levy, again" });
    expect(studySummary.parse(changed.body)).toMatchObject({ title: "Levy, again", lede: "Sweet drinks" });
    const titles = (await owner.ask("GET", "/api/studies")).body.map((one: { title: string }) => one.title);
    expect(titles).toEqual(["Levy, again", "Another"]);
  });
});

describe("people", () => {
  test("come by invitation, and cannot be put in without being asked", async () => {
    const put = await owner.ask("POST", study("/people"), { email: other.email, role: "reader" });
    expect(put.status).toBe(404);
    await join("reader");
    expect((await other.ask("GET", study())).body.role).toBe("reader");
    const [, added] = (await owner.ask("GET", study("/people"))).body;
    expect(person.parse(added)).toMatchObject({ id: other.id, role: "reader" });
    const twice = await owner.ask("POST", study("/invitations"), { email: other.email, role: "owner" });
    expect([twice.status, twice.body.error.sentence]).toEqual([409, "Tomas Adeyemi is the study's reader already."]);
  });

  test("get another role at once, and their sockets come back with it", async () => {
    const changed = await owner.ask("PATCH", study(`/people/${other.id}`), { role: "coauthor" });
    expect([changed.status, changed.body.role]).toEqual([200, "coauthor"]);
    expect(application.sockets.closed).toEqual([`${other.id} ${studyId}`]);
    expect((await other.ask("PATCH", study(), { lede: "by a coauthor" })).status).toBe(200);
  });

  test("always include an owner", async () => {
    for (const answer of [
      await owner.ask("PATCH", study(`/people/${owner.id}`), { role: "reader" }),
      await owner.ask("DELETE", study(`/people/${owner.id}`)),
    ]) {
      expect([answer.status, answer.body.error.sentence]).toEqual([409, expect.stringContaining("only owner")]);
    }
    expect((await owner.ask("GET", study())).body.role).toBe("owner");
  });

  test("may leave of themselves but remove nobody, and are gone at once", async () => {
    expect((await other.ask("DELETE", study(`/people/${owner.id}`))).status).toBe(403);
    expect((await other.ask("DELETE", study(`/people/${other.id}`))).status).toBe(204);
    expect(application.sockets.closed).toHaveLength(2);
    expect((await other.ask("GET", study())).status).toBe(404);
  });
});

test("estimations are passed on, with who asked", async () => {
  const { cellId } = application.cells.put(studyId, { name: "base", kind: "system", source: "" }, ["survey"]);
  application.cells.calls.length = 0;
  expect((await owner.ask("POST", study(`/cells/${cellId}/estimation`))).status).toBe(202);
  expect((await owner.ask("DELETE", study(`/cells/${cellId}/estimation`))).status).toBe(200);
  expect((await owner.ask("POST", study("/estimations"))).status).toBe(202);
  expect((await owner.ask("POST", study("/cells/none/estimation"))).status).toBe(404);
  expect(application.cells.calls).toEqual([
    `estimate ${studyId} ${cellId} ${owner.id}`,
    `cancel ${studyId} ${cellId}`,
    `bring up to date ${studyId} ${owner.id}`,
  ]);
});

test("a deleted study is gone for everyone, and its sockets are closed", async () => {
  await join("reader");
  application.sockets.closed.length = 0;
  expect((await owner.ask("DELETE", study())).status).toBe(204);
  expect(application.cells.calls).toContain(`removed ${studyId}`);
  expect(application.sockets.closed.sort()).toEqual([`${owner.id} ${studyId}`, `${other.id} ${studyId}`].sort());
  expect((await owner.ask("GET", study())).status).toBe(404);
});
