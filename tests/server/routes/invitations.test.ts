import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { invitations } from "../../../server/db/schema/invitations.ts";
import { invitation, linkedInvitation, openInvitation } from "../../../shared/schemas/invitations.ts";
import {
  type Application,
  cookieOf,
  letterTo,
  PASSPHRASE,
  startApplication,
  type Visitor,
} from "../../support/application.ts";

let application: Application;
let owner: Visitor;
let coauthor: Visitor;
let outsider: Visitor;
let studyId: string;

const study = (rest = "") => `/api/studies/${studyId}${rest}`;
const invite = (who: Visitor, email: unknown, role: unknown = "reader") =>
  who.ask("POST", study("/invitations"), { email, role });
const tokenFor = async (email: string) => (await letterTo(application, email)).token;

beforeAll(async () => {
  application = await startApplication();
  owner = await application.person("Ilse Marchetti");
  coauthor = await application.person("Tomas Adeyemi");
  outsider = await application.person("Petra Vance");
  studyId = (await owner.ask("POST", "/api/studies", { title: "Levy" })).body.id;
  await invite(owner, coauthor.email, "coauthor");
  await coauthor.ask("POST", `/api/invitations/${await tokenFor(coauthor.email)}`);
});
afterAll(() => application.close());

describe("inviting", () => {
  test("takes someone signed in, a whole invitation, and an owner", async () => {
    expect((await invite(application.stranger, "new@vihe.example")).status).toBe(401);
    expect((await invite(owner, "no address")).status).toBe(400);
    expect((await invite(owner, "new@vihe.example", "king")).status).toBe(400);
    expect((await invite(coauthor, "new@vihe.example")).status).toBe(403);
    expect((await invite(outsider, "new@vihe.example")).status).toBe(404);
    expect((await coauthor.ask("GET", study("/invitations"))).status).toBe(403);
  });

  test("answers alike whether the address has an account, and sends a message to both", async () => {
    const known = await invite(owner, outsider.email.toUpperCase());
    const unknown = await invite(owner, "nobody@vihe.example");
    expect([known.status, unknown.status]).toEqual([201, 201]);
    const shapes = [known, unknown].map(({ body }) => ({
      ...invitation.parse(body),
      id: "",
      email: "",
      invitedAt: "",
      expiresAt: "",
    }));
    expect(shapes[0]).toEqual(shapes[1]);
    const { subject, text } = await letterTo(application, "nobody@vihe.example");
    expect(subject).toBe("Ilse Marchetti invites you to “Levy”");
    expect(text).toContain(`${application.origin}/invitation/`);
  });

  test("opens for fourteen days, and keeps of its link the hash", async () => {
    const { expiresAt, invitedAt } = (await owner.ask("GET", study("/invitations"))).body[0];
    expect(Date.parse(expiresAt) - Date.parse(invitedAt)).toBe(14 * 24 * 3_600_000);
    const token = await tokenFor("nobody@vihe.example");
    const rows = JSON.stringify(application.open.db.select().from(invitations).all());
    expect(rows).not.toContain(token);
    expect(JSON.stringify(application.open.sqlite.prepare("select * from mails").all())).not.toContain(token);
  });

  test("again sends a new link, and the old one opens nothing any more", async () => {
    const before = await tokenFor("nobody@vihe.example");
    const { id } = (await owner.ask("GET", study("/invitations"))).body.find(
      ({ email }: { email: string }) => email === "nobody@vihe.example",
    );
    expect((await owner.ask("POST", study(`/invitations/${id}`))).status).toBe(200);
    expect((await application.stranger.ask("GET", `/api/invitations/${before}`)).status).toBe(404);
    await expect.poll(() => tokenFor("nobody@vihe.example")).not.toBe(before);
    const open = await application.stranger.ask("GET", `/api/invitations/${await tokenFor("nobody@vihe.example")}`);
    expect(linkedInvitation.parse(open.body)).toMatchObject({ study: "Levy", role: "reader", hasAccount: false });
  });

  test("is withdrawn, and the link then opens nothing", async () => {
    await invite(owner, "withdrawn@vihe.example");
    const token = await tokenFor("withdrawn@vihe.example");
    const list = (await owner.ask("GET", study("/invitations"))).body as { id: string; email: string }[];
    const id = list.find(({ email }) => email === "withdrawn@vihe.example")?.id;
    expect((await coauthor.ask("DELETE", study(`/invitations/${id}`))).status).toBe(403);
    expect((await owner.ask("DELETE", study(`/invitations/${id}`))).status).toBe(204);
    expect((await application.stranger.ask("GET", `/api/invitations/${token}`)).status).toBe(404);
  });
});

describe("answering", () => {
  test("as another account is refused in words that name both", async () => {
    const token = await tokenFor("nobody@vihe.example");
    expect((await application.stranger.ask("POST", `/api/invitations/${token}`)).status).toBe(401);
    const wrong = await outsider.ask("POST", `/api/invitations/${token}`);
    expect([wrong.status, wrong.body.error.sentence]).toEqual([
      403,
      "This invitation is for nobody@vihe.example, and you are signed in as petra.vance@vihe.example.",
    ]);
  });

  test("by a new account makes it under the invited address, signs in and joins, once", async () => {
    const path = `/api/invitations/${await tokenFor("nobody@vihe.example")}/account`;
    const short = await application.stranger.ask("POST", path, { name: "Nora", password: "nine char" });
    expect([short.status, short.body.error.sentence]).toEqual([
      400,
      expect.stringContaining("9 characters and needs at least 10"),
    ]);
    const made = await application.stranger.ask("POST", path, { name: "Nora Lind", password: PASSPHRASE });
    expect([made.status, made.body]).toEqual([201, { studyId }]);
    const nora = application.visitor(undefined, cookieOf(made));
    expect((await nora.ask("GET", "/api/me")).body).toMatchObject({ name: "Nora Lind", email: "nobody@vihe.example" });
    expect((await nora.ask("GET", "/api/account")).body.isConfirmed).toBe(true);
    expect((await nora.ask("GET", study())).body.role).toBe("reader");
    expect((await application.stranger.ask("POST", path, { name: "Nora", password: PASSPHRASE })).status).toBe(404);
  });

  test("can be done among one's studies, without the link", async () => {
    const [waiting] = (await outsider.ask("GET", "/api/account/invitations")).body;
    expect(openInvitation.parse(waiting)).toMatchObject({ inviter: "Ilse Marchetti", study: "Levy" });
    expect((await coauthor.ask("POST", `/api/account/invitations/${waiting.id}`)).status).toBe(404);
    expect((await outsider.ask("POST", `/api/account/invitations/${waiting.id}`)).body).toEqual({ studyId });
    expect((await outsider.ask("GET", study())).body.role).toBe("reader");
    expect((await outsider.ask("GET", "/api/account/invitations")).body).toEqual([]);
  });

  test("may be to refuse, and nothing is made", async () => {
    await invite(owner, "refuses@vihe.example");
    const token = await tokenFor("refuses@vihe.example");
    expect((await application.stranger.ask("DELETE", `/api/invitations/${token}`)).status).toBe(204);
    expect((await application.stranger.ask("GET", `/api/invitations/${token}`)).status).toBe(404);
    const entries = (await owner.ask("GET", study("/journal"))).body.entries;
    expect(entries[0]).toMatchObject({ action: "invitation refused", subject: "refuses@vihe.example" });
  });

  test("comes too late when the link has run out, and the owner is told that it has", async () => {
    await invite(owner, "late@vihe.example");
    const token = await tokenFor("late@vihe.example");
    application.open.sqlite.prepare("update invitations set expires_at = 1 where email = ?").run("late@vihe.example");
    expect((await application.stranger.ask("GET", `/api/invitations/${token}`)).status).toBe(404);
    const [late] = (await owner.ask("GET", study("/invitations"))).body;
    expect(late).toMatchObject({ email: "late@vihe.example", hasRunOut: true });
  });
});

test("messages are limited for whoever causes them and for whom they go to", async () => {
  const strict = await startApplication({ limits: { mailsPerHour: 12 } });
  const someone = await strict.person("Ilse Marchetti");
  const { id } = (await someone.ask("POST", "/api/studies", { title: "Levy" })).body;
  const again = (email: string) => someone.ask("POST", `/api/studies/${id}/invitations`, { email, role: "reader" });
  for (let i = 0; i < 10; i++) expect((await again("one@vihe.example")).status).toBe(201);
  const pestered = await again("one@vihe.example");
  expect([pestered.status, pestered.body.error.sentence]).toEqual([429, expect.stringContaining("to this address")]);
  expect((await again("two@vihe.example")).status).toBe(201);
  const many = await again("three@vihe.example");
  expect([many.status, many.body.error.sentence]).toEqual([429, expect.stringContaining("asked for from here")]);
  await strict.close();
});
