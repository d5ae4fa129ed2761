import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { accountSummary, postBox } from "../../../shared/schemas/accounts.ts";
import { journalPage } from "../../../shared/schemas/journal.ts";
import { type Application, letterTo, startApplication, type Visitor } from "../../support/application.ts";

let application: Application;
let administrator: Visitor;
let other: Visitor;

beforeAll(async () => {
  application = await startApplication({ administrators: ["ilse.marchetti@vihe.example"] });
  administrator = await application.person("Ilse Marchetti");
  other = await application.person("Tomas Adeyemi");
});
afterAll(() => application.close());

test("is for administrators and nobody else", async () => {
  for (const [method, path] of [
    ["GET", "/api/administration/mails"],
    ["POST", "/api/administration/mails/some"],
    ["GET", "/api/administration/accounts"],
    ["GET", "/api/administration/journal"],
  ]) {
    expect([path, (await application.stranger.ask(method, path)).status]).toEqual([path, 401]);
    expect([path, (await other.ask(method, path)).status]).toEqual([path, 403]);
  }
  expect((await administrator.ask("GET", "/api/me")).body.isAdministrator).toBe(true);
  expect((await other.ask("GET", "/api/me")).body).not.toHaveProperty("isAdministrator");
});

test("is not given by an address that nobody has confirmed", async () => {
  const confirm = (is: number) =>
    application.open.sqlite.prepare("update user set email_verified = ? where id = ?").run(is, administrator.id);
  confirm(0);
  expect((await administrator.ask("GET", "/api/administration/mails")).status).toBe(403);
  confirm(1);
});

test("opens no study", async () => {
  const { id } = (await other.ask("POST", "/api/studies", { title: "Levy" })).body;
  expect((await administrator.ask("GET", `/api/studies/${id}`)).status).toBe(404);
  expect((await administrator.ask("GET", `/api/studies/${id}/journal`)).status).toBe(404);
});

describe("the local post box", () => {
  test("keeps what would have been sent, to be read", async () => {
    await application.stranger.ask("POST", "/api/account-links", { email: "nora@vihe.example" });
    await letterTo(application, "nora@vihe.example");
    const { kind, mails } = postBox.parse((await administrator.ask("GET", "/api/administration/mails")).body);
    expect(kind).toBe("post box");
    expect(mails[0]).toMatchObject({ to: "nora@vihe.example", state: "kept", subject: "Finish your account" });
    expect(mails[0].text).toContain("/create-account/");
    expect((await administrator.ask("POST", "/api/administration/mails/none")).status).toBe(404);
    expect((await administrator.ask("POST", `/api/administration/mails/${mails[0].id}`)).status).toBe(409);
  });
});

test("lists accounts, with nothing of their studies but how many", async () => {
  const accounts = (await administrator.ask("GET", "/api/administration/accounts")).body;
  expect(accounts.map((one: unknown) => accountSummary.parse(one).email).sort()).toEqual([
    "ilse.marchetti@vihe.example",
    "tomas.adeyemi@vihe.example",
  ]);
  expect(JSON.stringify(accounts)).not.toContain("Levy");
});

test("reads in the journal that an address was locked, and of the address only how it begins and ends", async () => {
  application.services.accountEvents.locked("petra@vihe.example");
  const page = journalPage.parse((await administrator.ask("GET", "/api/administration/journal")).body);
  expect(page.entries[0]).toMatchObject({ action: "sign-in locked", subject: "p…@vihe.example" });
  expect((await administrator.ask("GET", "/api/administration/journal?before=x")).status).toBe(400);
});
