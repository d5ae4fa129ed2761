import { getTableColumns, getTableName, is } from "drizzle-orm";
import { SQLiteTable } from "drizzle-orm/sqlite-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { deletePerson, insertPerson } from "../../../server/db/queries/people.ts";
import * as schema from "../../../server/db/schema/index.ts";
import { type OwnData, ownData } from "../../../shared/schemas/own-data.ts";
import { type Application, startApplication, type Visitor } from "../../support/application.ts";

let application: Application;
let ilse: Visitor;
let petra: Visitor;
let studyId: string;
let leftId: string;

const keptOf = async (who: Visitor): Promise<OwnData> =>
  ownData.parse((await who.ask("GET", "/api/account/data")).body);

beforeAll(async () => {
  application = await startApplication();
  [ilse, petra] = await Promise.all(["Ilse Marchetti", "Petra Vance"].map(application.person));
  const make = async (title: string) => (await ilse.ask("POST", "/api/studies", { title })).body.id as string;
  studyId = await make("Levy");
  leftId = await make("Bread");
  for (const id of [studyId, leftId]) {
    insertPerson(application.open.db, id, petra.id, "coauthor", new Date());
    const { cellId } = application.cells.put(id, { name: "base", kind: "system", source: "" }, []);
    const path = `/api/studies/${id}/remarks`;
    const made = await petra.ask("POST", path, { cellId, text: `Hers, of ${id}.`, anchor: "verdict Symmetry" });
    await ilse.ask("POST", `${path}/${made.body.id}/replies`, { text: "Not hers." });
    await petra.ask("POST", `${path}/${made.body.id}/replies`, { text: "Hers again." });
  }
  const form = new FormData();
  form.set("file", new Blob(["p1\n1\n"]), "weeks.csv");
  await petra.ask("POST", `/api/studies/${studyId}/uploads`, form);
  await petra.ask("POST", `/api/studies/${studyId}/checkpoints`, { name: "As sent", note: "" });
  await petra.ask("POST", "/api/account/address", { email: "petra@elsewhere.example" });
  const third = await make("Salt");
  await ilse.ask("POST", `/api/studies/${third}/invitations`, { email: petra.email, role: "reader" });
  const people = JSON.stringify([ilse.id, petra.id]);
  const at = new Date("2031-03-02T10:00:00Z");
  application.open.db
    .insert(schema.cellSittings)
    .values({ studyId, cellId: "c", people, startedAt: at, endedAt: at, before: null })
    .run();
  deletePerson(application.open.db, leftId, petra.id);
});
afterAll(() => application.close());

describe("what is kept about a person", () => {
  test("is told to nobody without a session, and to oneself as a file", async () => {
    expect((await application.stranger.ask("GET", "/api/account/data")).status).toBe(401);
    const answer = await petra.ask("GET", "/api/account/data");
    expect(answer.status).toBe(200);
    expect(answer.headers.get("content-disposition")).toBe("attachment; filename=what-is-kept.json");
    expect(answer.headers.get("cache-control")).toContain("no-store");
  });

  test("is the account, its sessions, studies, words and deeds, and nothing of another's", async () => {
    const kept = await keptOf(petra);
    expect(kept.account).toMatchObject({ id: petra.id, name: petra.name, email: petra.email });
    expect(kept.sessions).toHaveLength(1);
    expect(kept.studies).toEqual([
      { study: { id: studyId, title: "Levy" }, role: "coauthor", since: expect.any(String) },
    ]);
    expect(kept.remarks.map(({ text, cell, about }) => [text, cell, about])).toEqual([
      [`Hers, of ${studyId}.`, "base", "verdict Symmetry"],
      // Out of this study: her words are hers, its cells are not.
      [`Hers, of ${leftId}.`, undefined, "verdict Symmetry"],
    ]);
    expect(kept.replies.map(({ text }) => text)).toEqual(["Hers again.", "Hers again."]);
    expect(kept.edits).toHaveLength(1);
    expect(kept.uploads.map(({ name, study }) => [name, study.title])).toEqual([["weeks.csv", "Levy"]]);
    expect(kept.checkpoints.map(({ name }) => name)).toEqual(["As sent"]);
    expect(kept.addressesAskedFor.map(({ email }) => email)).toEqual(["petra@elsewhere.example"]);
    expect(kept.invitations.map(({ role }) => role)).toEqual(["reader"]);
    expect(kept.messages.length).toBeGreaterThan(0);
    expect(kept.journal.map(({ action, byYou }) => [action, byYou])).toEqual([
      ["upload added", true],
      ["checkpoint kept", true],
      ["person invited", false],
    ]);
    expect(JSON.stringify(kept)).not.toMatch(/Not hers|Bread/);
    const others = await keptOf(ilse);
    expect(JSON.stringify(others)).not.toContain("Hers");
  });

  test("has no secret in it: no hash, no token, no sealed words", async () => {
    const { sqlite } = application.open;
    const told = JSON.stringify(await keptOf(petra));
    const secrets = [
      "select token from session",
      "select password from account",
      "select token_hash from address_links",
      "select token_hash from invitations",
      "select words from mails where words is not null",
    ].flatMap((query) => sqlite.prepare(query).pluck().all() as string[]);
    expect(secrets.length).toBeGreaterThan(5);
    for (const secret of secrets) expect(told).not.toContain(secret);
  });

  test("comes from every table in which a row names a person", () => {
    const told = [
      ...["user", "session", "address_links", "mails", "invitations", "study_members", "remarks", "remark_replies"],
      ...["cell_sittings", "cell_findings", "uploads", "checkpoints", "referee_copies", "journal"],
    ];
    // The passphrase, which is told to nobody; links of the authentication package; edits, told by their sittings.
    const untold = ["account", "verification", "document_updates"];
    const naming = Object.values(schema)
      .filter((table) => is(table, SQLiteTable))
      .filter((table) =>
        Object.keys(getTableColumns(table)).some((key) =>
          /^(userId|authorId|actorId|people|email|recipient|identifier|uploadedBy|madeBy|sealedBy|invitedBy)$/.test(
            key,
          ),
        ),
      )
      .map((table) => getTableName(table));
    expect(naming.toSorted()).toEqual([...told, ...untold].toSorted());
  });
});
