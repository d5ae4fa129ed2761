import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { addressLinks } from "../../../server/db/schema/invitations.ts";
import { ownAccount } from "../../../shared/schemas/accounts.ts";
import {
  type Application,
  cookieOf,
  letterTo,
  PASSPHRASE,
  startApplication,
  type Visitor,
} from "../../support/application.ts";

let application: Application;
let ilse: Visitor;
const OTHER_PASSPHRASE = "a tangent and its point";

beforeAll(async () => {
  application = await startApplication();
  ilse = await application.person("Ilse Marchetti");
});
afterAll(() => application.close());

const ask = (method: string, path: string, body?: unknown) => application.stranger.ask(method, path, body);
const signIn = (email: string, password: string) => ask("POST", "/api/auth/sign-in/email", { email, password });
const letter = (email: string) => letterTo(application, email);

describe("an account", () => {
  test("is asked for by an address, with the same answer whether it has one", async () => {
    expect((await ask("POST", "/api/account-links", { email: "no address" })).status).toBe(400);
    const known = await ask("POST", "/api/account-links", { email: "Ilse.Marchetti@vihe.example" });
    const unknown = await ask("POST", "/api/account-links", { email: "Nora@vihe.example" });
    expect([known.status, known.body]).toEqual([202, ""]);
    expect([unknown.status, unknown.body]).toEqual([known.status, known.body]);
    expect((await letter(ilse.email)).subject).toBe("You have an account already");
    expect((await letter("nora@vihe.example")).subject).toBe("Finish your account");
  });

  test("is made behind the link, once, and is signed in with its address confirmed", async () => {
    const { token } = await letter("nora@vihe.example");
    expect(JSON.stringify(application.open.db.select().from(addressLinks).all())).not.toContain(token);
    const path = `/api/account-links/${token}`;
    expect((await ask("GET", "/api/account-links/another")).status).toBe(404);
    expect((await ask("GET", path)).body).toEqual({ email: "nora@vihe.example" });
    const short = await ask("POST", path, { name: "Nora", password: "nine char" });
    expect([short.status, short.body.error.sentence]).toEqual([
      400,
      expect.stringContaining("9 characters and needs at least 10"),
    ]);
    const made = await ask("POST", path, { name: "Nora Lind", password: PASSPHRASE });
    expect(made.status).toBe(201);
    const me = await application.visitor(undefined, cookieOf(made)).ask("GET", "/api/account");
    expect(ownAccount.parse(me.body)).toMatchObject({ name: "Nora Lind", isConfirmed: true });
    expect((await ask("POST", path, { name: "Nora Lind", password: PASSPHRASE })).status).toBe(404);
  });

  test("keeps nothing of a link that has run out", async () => {
    await ask("POST", "/api/account-links", { email: "late@vihe.example" });
    const { token } = await letter("late@vihe.example");
    application.open.sqlite.prepare("update address_links set expires_at = 1").run();
    expect((await ask("GET", `/api/account-links/${token}`)).status).toBe(404);
    application.services.accounts.removeOldLinks();
    expect(application.open.db.select().from(addressLinks).all()).toEqual([]);
  });
});

describe("a forgotten passphrase", () => {
  test("is asked about with the same answer for every address", async () => {
    const path = "/api/auth/request-password-reset";
    expect((await ask("POST", path, { email: "x" })).status).toBe(400);
    const unknown = await ask("POST", path, { email: "nobody@vihe.example" });
    const known = await ask("POST", path, { email: ilse.email });
    expect([known.status, known.body]).toEqual([unknown.status, unknown.body]);
    await expect.poll(async () => (await letter(ilse.email)).subject).toBe("Set a new passphrase");
    expect(application.mail.list().some(({ recipient }) => recipient === "nobody@vihe.example")).toBe(false);
  });

  test("is set anew by the link, once; every session ends, and other links open nothing", async () => {
    const first = (await letter(ilse.email)).token;
    await ask("POST", "/api/auth/request-password-reset", { email: ilse.email });
    await expect.poll(async () => (await letter(ilse.email)).token).not.toBe(first);
    const { token } = await letter(ilse.email);
    const kept = application.open.sqlite.prepare("select identifier from verification").all();
    expect(JSON.stringify(kept)).not.toContain(token);
    application.sockets.closed.length = 0;
    const reset = (words: string, link: string) =>
      ask("POST", "/api/auth/reset-password", { newPassword: words, token: link });
    expect((await reset("too short", token)).status).toBe(400);
    expect((await reset(OTHER_PASSPHRASE, "another-token-altogether")).status).toBe(400);
    expect((await reset(OTHER_PASSPHRASE, token)).status).toBe(200);
    const used = await reset("yet another passphrase", token);
    expect([used.status, used.body.error.sentence]).toEqual([400, expect.stringContaining("has been used")]);
    expect((await reset("yet another passphrase", first)).status).toBe(400);
    expect((await ilse.ask("GET", "/api/me")).status).toBe(401);
    expect(application.sockets.closed).toEqual([expect.stringMatching(/^session /)]);
    expect((await signIn(ilse.email, PASSPHRASE)).status).toBe(401);
    const back = await signIn(ilse.email, OTHER_PASSPHRASE);
    expect(back.status).toBe(200);
    ilse = application.visitor(ilse, cookieOf(back));
  });
});

describe("one's own account", () => {
  test("is nobody's without a session", async () => {
    for (const [method, path] of [
      ["GET", "/api/account"],
      ["GET", "/api/account/data"],
      ["PATCH", "/api/account"],
      ["DELETE", "/api/account"],
      ["POST", "/api/account/address"],
      ["DELETE", "/api/account/sessions"],
      ["DELETE", "/api/account/sessions/some"],
      ["GET", "/api/account/invitations"],
      ["POST", "/api/auth/change-password"],
    ]) {
      expect([path, (await ask(method, path, method === "GET" ? undefined : {})).status]).toEqual([path, 401]);
    }
  });

  test("gets another name", async () => {
    expect((await ilse.ask("PATCH", "/api/account", { name: " " })).status).toBe(400);
    expect((await ilse.ask("PATCH", "/api/account", { name: "Ilse M." })).body.name).toBe("Ilse M.");
    expect((await ilse.ask("GET", "/api/me")).body.name).toBe("Ilse M.");
  });

  test("moves to another address once its reader has followed the link, and the old one is told", async () => {
    expect((await ilse.ask("POST", "/api/account/address", { email: "ilse@elsewhere.example" })).status).toBe(202);
    const { token } = await letter("ilse@elsewhere.example");
    expect((await ilse.ask("GET", "/api/me")).body.email).toBe(ilse.email);
    expect((await ask("POST", "/api/address-links/another")).status).toBe(404);
    expect((await ask("POST", `/api/address-links/${token}`)).body).toEqual({ email: "ilse@elsewhere.example" });
    expect((await ask("POST", `/api/address-links/${token}`)).status).toBe(404);
    expect((await ilse.ask("GET", "/api/me")).body.email).toBe("ilse@elsewhere.example");
    await expect.poll(async () => (await letter(ilse.email)).subject).toBe("The address of your account has changed");
  });

  test("does not move to an address that another account has, and does not say so to the one who asks", async () => {
    const answer = await ilse.ask("POST", "/api/account/address", { email: "nora@vihe.example" });
    expect([answer.status, answer.body]).toEqual([202, ""]);
    await expect
      .poll(async () => (await letter("nora@vihe.example")).subject)
      .toBe("Your address stays with your account");
  });

  test("shows its sessions and ends one, or all others, with their sockets", async () => {
    const others = [];
    for (let i = 0; i < 3; i++) {
      others.push(application.visitor(ilse, cookieOf(await signIn("ilse@elsewhere.example", OTHER_PASSPHRASE))));
    }
    const { sessions } = (await ilse.ask("GET", "/api/account")).body as {
      sessions: { id: string; isThis: boolean }[];
    };
    expect(sessions.map(({ isThis }) => isThis).filter(Boolean)).toHaveLength(1);
    expect(sessions).toHaveLength(4);
    application.sockets.closed.length = 0;
    const nora = application.visitor(undefined, cookieOf(await signIn("nora@vihe.example", PASSPHRASE)));
    const [one] = sessions.filter(({ isThis }) => !isThis);
    expect((await nora.ask("DELETE", `/api/account/sessions/${one.id}`)).status).toBe(404);
    expect((await ilse.ask("DELETE", `/api/account/sessions/${one.id}`)).status).toBe(204);
    expect(application.sockets.closed).toEqual([`session ${one.id}`]);
    expect((await ilse.ask("DELETE", "/api/account/sessions")).status).toBe(204);
    expect(application.sockets.closed).toHaveLength(3);
    for (const other of others) expect((await other.ask("GET", "/api/me")).status).toBe(401);
    expect((await ilse.ask("GET", "/api/me")).status).toBe(200);
    expect((await nora.ask("GET", "/api/me")).status).toBe(200);
  });

  test("gets another passphrase from who knows the old one, and every other session ends", async () => {
    const other = application.visitor(ilse, cookieOf(await signIn("ilse@elsewhere.example", OTHER_PASSPHRASE)));
    const change = (currentPassword: string, newPassword: string) =>
      ilse.ask("POST", "/api/auth/change-password", { currentPassword, newPassword });
    expect((await change(OTHER_PASSPHRASE, "short")).status).toBe(400);
    const wrong = await change("not the passphrase", PASSPHRASE);
    expect([wrong.status, wrong.body.error.sentence]).toEqual([400, "This is not the passphrase you have now."]);
    expect((await change(OTHER_PASSPHRASE, PASSPHRASE)).status).toBe(200);
    await expect.poll(async () => (await other.ask("GET", "/api/me")).status).toBe(401);
    expect((await ilse.ask("GET", "/api/me")).status).toBe(200);
  });

  test("stays while a study with others would lose its only owner, and goes after", async () => {
    const { id } = (await ilse.ask("POST", "/api/studies", { title: "Levy" })).body;
    const alone = (await ilse.ask("POST", "/api/studies", { title: "Notes" })).body.id;
    const nora = application.visitor(undefined, cookieOf(await signIn("nora@vihe.example", PASSPHRASE)));
    await ilse.ask("POST", `/api/studies/${id}/invitations`, { email: "nora@vihe.example", role: "coauthor" });
    const [waiting] = (await nora.ask("GET", "/api/account/invitations")).body;
    await nora.ask("POST", `/api/account/invitations/${waiting.id}`);
    const own = ownAccount.parse((await ilse.ask("GET", "/api/account")).body);
    expect(own.toHandOver).toEqual([{ studyId: id, title: "Levy", others: 1 }]);
    expect(own.alone).toEqual([{ studyId: alone, title: "Notes", others: 0 }]);
    expect((await ilse.ask("DELETE", "/api/account", { password: "not the passphrase" })).status).toBe(403);
    const refused = await ilse.ask("DELETE", "/api/account", { password: PASSPHRASE });
    expect([refused.status, refused.body.error.sentence]).toEqual([409, expect.stringContaining("You alone own Levy")]);
    const noraId = (await nora.ask("GET", "/api/me")).body.id;
    expect((await ilse.ask("POST", `/api/studies/${id}/owner`, { userId: noraId })).status).toBe(200);
    expect((await ilse.ask("DELETE", "/api/account", { password: PASSPHRASE })).status).toBe(204);
    expect((await ilse.ask("GET", "/api/me")).status).toBe(401);
    expect((await signIn("ilse@elsewhere.example", PASSPHRASE)).status).toBe(401);
    expect((await nora.ask("GET", `/api/studies/${id}`)).body.people).toHaveLength(1);
    expect(application.cells.calls).toContain(`removed ${alone}`);
    const { entries } = (await nora.ask("GET", `/api/studies/${id}/journal`)).body;
    expect(entries.at(-1)).toMatchObject({ action: "study made", by: "someone no longer here" });
  });
});
