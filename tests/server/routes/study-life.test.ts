import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { deletedStudy } from "../../../shared/schemas/accounts.ts";
import { journalPage } from "../../../shared/schemas/journal.ts";
import { type Application, letterTo, startApplication, type Visitor } from "../../support/application.ts";

const DAY = 24 * 3_600_000;

let application: Application;
let owner: Visitor;
let coauthor: Visitor;
let reader: Visitor;
let outsider: Visitor;
let studyId: string;

const study = (rest = "") => `/api/studies/${studyId}${rest}`;
const titlesOf = async (who: Visitor) =>
  (await who.ask("GET", "/api/studies")).body.map((one: { title: string }) => one.title);
const actionsFor = async (who: Visitor) =>
  journalPage.parse((await who.ask("GET", study("/journal"))).body).entries.map(({ action }) => action);

beforeAll(async () => {
  application = await startApplication();
  owner = await application.person("Ilse Marchetti");
  coauthor = await application.person("Tomas Adeyemi");
  reader = await application.person("Petra Vance");
  outsider = await application.person("Nora Lind");
  studyId = (await owner.ask("POST", "/api/studies", { title: "Levy" })).body.id;
  for (const [who, role] of [
    [coauthor, "coauthor"],
    [reader, "reader"],
  ] as const) {
    await owner.ask("POST", study("/invitations"), { email: who.email, role });
    await who.ask("POST", `/api/invitations/${(await letterTo(application, who.email)).token}`);
  }
});
afterAll(() => application.close());

describe("putting away", () => {
  test("is each person's own, and brings back", async () => {
    expect((await application.stranger.ask("POST", study("/put-away"))).status).toBe(401);
    expect((await outsider.ask("POST", study("/put-away"))).status).toBe(404);
    expect((await reader.ask("POST", study("/put-away"))).status).toBe(204);
    expect((await reader.ask("GET", "/api/studies")).body[0].isPutAway).toBe(true);
    expect((await owner.ask("GET", "/api/studies")).body[0]).not.toHaveProperty("isPutAway");
    expect((await reader.ask("GET", study())).status).toBe(200);
    expect((await reader.ask("DELETE", study("/put-away"))).status).toBe(204);
    expect((await reader.ask("GET", "/api/studies")).body[0]).not.toHaveProperty("isPutAway");
  });
});

describe("the journal", () => {
  test("is for the study's people, and tells owners of invitations", async () => {
    expect((await application.stranger.ask("GET", study("/journal"))).status).toBe(401);
    expect((await owner.ask("GET", study("/journal?before=none"))).status).toBe(400);
    expect((await outsider.ask("GET", study("/journal"))).status).toBe(404);
    expect(await actionsFor(owner)).toEqual([
      "person joined",
      "person invited",
      "person joined",
      "person invited",
      "study made",
    ]);
    expect(await actionsFor(reader)).toEqual(["person joined", "person joined", "study made"]);
  });

  test("comes a page at a time", async () => {
    for (let i = 0; i < 60; i++)
      application.journal.record({ studyId, actor: owner, action: "upload added", subject: `${i}` });
    const first = journalPage.parse((await owner.ask("GET", study("/journal"))).body);
    const second = journalPage.parse((await owner.ask("GET", study(`/journal?before=${first.next}`))).body);
    expect([first.entries.length, second.entries.length, second.next]).toEqual([50, 15, undefined]);
    expect(first.entries[49].id).toBe(second.entries[0].id + 1);
  });

  test("cannot be changed", () => {
    expect(() => application.open.sqlite.prepare("update journal set subject = 'x'").run()).toThrow(/never changed/);
  });
});

describe("handing over", () => {
  const handOver = (who: Visitor, userId: unknown) => who.ask("POST", study("/owner"), { userId });

  test("takes its owner, and a coauthor", async () => {
    expect((await handOver(application.stranger, coauthor.id)).status).toBe(401);
    expect((await handOver(owner, 7)).status).toBe(400);
    expect((await handOver(coauthor, coauthor.id)).status).toBe(403);
    expect((await handOver(outsider, coauthor.id)).status).toBe(404);
    expect((await handOver(owner, outsider.id)).status).toBe(404);
    const toReader = await handOver(owner, reader.id);
    expect([toReader.status, toReader.body.error.sentence]).toEqual([
      409,
      expect.stringContaining("handed over to a coauthor"),
    ]);
  });

  test("acts at once, on open sockets too, and the new owner is told", async () => {
    application.sockets.closed.length = 0;
    expect((await handOver(owner, coauthor.id)).status).toBe(200);
    expect((await coauthor.ask("GET", study())).body.role).toBe("owner");
    expect((await owner.ask("GET", study())).body.role).toBe("coauthor");
    expect(application.sockets.closed.sort()).toEqual([`${coauthor.id} ${studyId}`, `${owner.id} ${studyId}`].sort());
    await expect.poll(async () => (await letterTo(application, coauthor.email)).subject).toBe("“Levy” is yours");
    expect((await actionsFor(coauthor))[0]).toBe("ownership handed over");
    expect((await handOver(coauthor, owner.id)).status).toBe(200);
  });
});

describe("deleting", () => {
  const deleted = (rest = "") => `/api/deleted-studies/${studyId}${rest}`;

  test("takes an owner; then the study is gone for all but its owners, who find when it goes for good", async () => {
    expect((await application.stranger.ask("DELETE", study())).status).toBe(401);
    expect((await coauthor.ask("DELETE", study())).status).toBe(403);
    expect((await outsider.ask("DELETE", study())).status).toBe(404);
    application.sockets.closed.length = 0;
    expect((await owner.ask("DELETE", study())).status).toBe(204);
    expect(application.sockets.closed).toHaveLength(3);
    for (const who of [owner, coauthor, reader]) {
      expect((await who.ask("GET", study())).status).toBe(404);
      expect(await titlesOf(who)).toEqual([]);
    }
    const [one] = (await owner.ask("GET", "/api/deleted-studies")).body.map((each: unknown) =>
      deletedStudy.parse(each),
    );
    expect(Date.parse(one.purgedAt) - Date.parse(one.deletedAt)).toBe(30 * DAY);
    expect((await coauthor.ask("GET", "/api/deleted-studies")).body).toEqual([]);
  });

  test("can be taken back by an owner, with everyone and everything", async () => {
    expect((await application.stranger.ask("POST", deleted())).status).toBe(401);
    expect((await coauthor.ask("POST", deleted())).status).toBe(404);
    expect((await outsider.ask("POST", deleted())).status).toBe(404);
    expect((await owner.ask("POST", deleted())).status).toBe(204);
    expect((await owner.ask("POST", deleted())).status).toBe(404);
    expect((await reader.ask("GET", study())).body.people).toHaveLength(3);
    expect((await actionsFor(owner)).slice(0, 2)).toEqual(["study brought back", "study deleted"]);
  });

  test("keeps the study through the grace period, and nothing of it after", async () => {
    await owner.ask("DELETE", study());
    expect(application.services.studies.purgeDeleted(new Date(Date.now() + 29 * DAY))).toBe(0);
    expect((await owner.ask("GET", "/api/deleted-studies")).body).toHaveLength(1);
    expect(application.services.studies.purgeDeleted(new Date(Date.now() + 31 * DAY))).toBe(1);
    expect((await owner.ask("POST", deleted())).status).toBe(404);
    const left = application.open.sqlite.prepare("select count(*) as n from journal where study_id = ?").get(studyId);
    expect(left).toEqual({ n: 0 });
    expect(application.journal.ofInstallation(undefined).entries[0]).toMatchObject({
      action: "study deleted for good",
      subject: null,
    });
  });

  test("can be for good at once, by an owner, of a deleted study only", async () => {
    studyId = (await owner.ask("POST", "/api/studies", { title: "Microdata" })).body.id;
    expect((await owner.ask("DELETE", deleted())).status).toBe(404);
    await owner.ask("DELETE", study());
    expect((await application.stranger.ask("DELETE", deleted())).status).toBe(401);
    expect((await outsider.ask("DELETE", deleted())).status).toBe(404);
    expect((await owner.ask("DELETE", deleted())).status).toBe(204);
    expect(application.open.sqlite.prepare("select count(*) as n from studies where id = ?").get(studyId)).toEqual({
      n: 0,
    });
  });
});
