import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { account, session } from "../../../server/db/schema/auth.ts";
import { type Application, cookieOf, PASSPHRASE, startApplication } from "../../support/application.ts";

let application: Application;
beforeAll(async () => {
  application = await startApplication();
});
afterAll(() => application.close());

const signIn = (email: string, password: string, headers = {}) =>
  application.stranger.ask("POST", "/api/auth/sign-in/email", { email, password }, headers);

describe("an account", () => {
  test("is known by its cookie", async () => {
    await application.person("Ilse");
    const answer = await signIn("ilse@vihe.example", PASSPHRASE);
    expect(answer.status).toBe(200);
    const me = await application.stranger.ask("GET", "/api/me", undefined, { cookie: cookieOf(answer) });
    expect(me.body).toEqual({ id: answer.body.user.id, name: "Ilse", email: "ilse@vihe.example" });
  });

  test("keeps its session in the database and out of reach of scripts", async () => {
    const answer = await signIn("ilse@vihe.example", PASSPHRASE);
    const [cookie] = answer.headers.getSetCookie();
    expect(cookie).toMatch(/HttpOnly/i);
    expect(cookie).toMatch(/SameSite=Lax/i);
    expect(JSON.stringify(answer.body)).not.toContain("token");
    const token = decodeURIComponent(cookie.split(";")[0].split("=")[1]).split(".")[0];
    expect(
      application.open.db
        .select()
        .from(session)
        .all()
        .map((row) => row.token),
    ).toContain(token);
  });

  test("keeps its passphrase only under a function that is hard in memory", () => {
    const [stored] = application.open.db.select().from(account).all();
    expect(stored.password).toMatch(/^[0-9a-f]{32}:[0-9a-f]{128}$/);
    expect(stored.password).not.toContain(PASSPHRASE);
  });
});

describe("signing in", () => {
  test("says the same for a wrong passphrase and an unknown address", async () => {
    const wrong = await signIn("ilse@vihe.example", "not the passphrase");
    const unknown = await signIn("nobody@vihe.example", "not the passphrase");
    expect([wrong.status, unknown.status]).toEqual([401, 401]);
    expect(wrong.body).toEqual(unknown.body);
  });

  test("is refused from another site's page", async () => {
    for (const headers of [{ origin: "https://elsewhere.example" }, { origin: "null" }]) {
      const answer = await signIn("ilse@vihe.example", PASSPHRASE, headers);
      expect(answer.status).toBe(403);
      expect(answer.headers.getSetCookie()).toEqual([]);
    }
  });

  test("is refused by the authentication package itself, should our own check ever go", async () => {
    const request = new Request(`${application.origin}/api/auth/sign-in/email`, {
      method: "POST",
      headers: { "content-type": "application/json", origin: "https://elsewhere.example", cookie: "any=thing" },
      body: JSON.stringify({ email: "ilse@vihe.example", password: PASSPHRASE }),
    });
    expect((await application.auth.handler(request)).status).toBe(403);
  });

  test("out ends the session at once and closes its sockets", async () => {
    const answer = await signIn("ilse@vihe.example", PASSPHRASE);
    const cookie = cookieOf(answer);
    const out = await application.stranger.ask("POST", "/api/auth/sign-out", undefined, { cookie });
    expect(out.status).toBe(200);
    expect((await application.stranger.ask("GET", "/api/me", undefined, { cookie })).status).toBe(401);
    expect(application.sockets.closed).toEqual([expect.stringMatching(/^session /)]);
  });
});

test("no other door of the authentication package is open", async () => {
  for (const path of [
    "/api/auth/list-sessions",
    "/api/auth/reset-password/a-token",
    "/api/auth/ok",
    "/api/auth/error",
  ]) {
    expect((await application.stranger.ask("GET", path)).status).toBe(404);
  }
  for (const path of ["update-user", "sign-up/email", "delete-user", "change-email", "revoke-sessions"]) {
    expect((await application.stranger.ask("POST", `/api/auth/${path}`, { name: "x" })).status).toBe(404);
  }
});

test("cookies are Secure behind TLS", async () => {
  const secure = await startApplication({ secure: true });
  await secure.person("Ilse");
  const credentials = { email: "ilse@vihe.example", password: PASSPHRASE };
  const answer = await secure.stranger.ask("POST", "/api/auth/sign-in/email", credentials);
  expect(answer.headers.getSetCookie()[0]).toMatch(/^__Secure-.*; Secure/);
  await secure.close();
});

test("sign-ins are counted, and refused with a time to come back", async () => {
  const strict = await startApplication({ limits: { signInsPerMinute: 2 } });
  const attempt = () =>
    strict.stranger.ask("POST", "/api/auth/sign-in/email", { email: "a@vihe.example", password: "wrong one here" });
  expect([(await attempt()).status, (await attempt()).status]).toEqual([401, 401]);
  const refused = await attempt();
  expect(refused.status).toBe(429);
  expect(refused.body.error.code).toBe("too many requests");
  expect(Number(refused.headers.get("retry-after"))).toBeGreaterThan(0);
  await strict.close();
});
