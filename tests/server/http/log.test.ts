import { PassThrough } from "node:stream";
import { afterAll, beforeAll, expect, test } from "vitest";
import { type Application, PASSPHRASE, startApplication } from "../../support/application.ts";

const log = new PassThrough();
let written = "";
log.on("data", (part) => {
  written += part;
});
let application: Application;
beforeAll(async () => {
  application = await startApplication({ log });
});
afterAll(() => application.close());

test("a request is one line with its id, method, path and status, and nothing of anyone", async () => {
  const person = await application.person("Ilse Marchetti");
  const answer = await person.ask("GET", "/api/studies?email=ilse.marchetti@vihe.example");
  const token = "a-link-that-nobody-else-may-have-0123456789";
  await application.stranger.ask("GET", `/api/referee/${token}?x=1`);
  await application.stranger.ask("GET", `/referee/${token}`);
  await application.stranger.ask("GET", `/api/referee/${token}/deeper`);
  await application.stranger.ask("GET", `/API/Referee/${token}`);

  const lines = written
    .trim()
    .split("\n")
    .map((line) => JSON.parse(line));
  const line = lines.find(({ req }) => req.id === answer.headers.get("x-request-id"));
  expect(line).toMatchObject({ req: { method: "GET", path: "/api/studies" }, res: { status: 200 } });
  expect(lines.filter(({ req }) => /\/referee\/…/i.test(req.path))).toHaveLength(4);
  for (const secret of [token, PASSPHRASE, "ilse.marchetti", "127.0.0.1", "cookie", "session_token"]) {
    expect(written).not.toContain(secret);
  }
});

test("what nobody foresaw is logged whole and told in one sentence", async () => {
  const person = await application.person("Tomas Adeyemi");
  const { id } = (await person.ask("POST", "/api/studies", { title: "Levy" })).body;
  application.services.cells.status = () => {
    throw new Error("the shelf fell down");
  };
  const answer = await person.ask("GET", `/api/studies/${id}/status`);
  expect([answer.status, answer.body.error.code]).toEqual([500, "unforeseen"]);
  expect(JSON.stringify(answer.body)).not.toContain("shelf");
  expect(written).toContain("the shelf fell down");
});

test("pages are told to let no inline script and no foreign frame in, and to name no referrer", async () => {
  const { headers } = await application.stranger.ask("GET", "/api/installation");
  const policy = headers.get("content-security-policy") ?? "";
  expect(policy).toContain("script-src 'self';");
  expect(policy).toContain("frame-ancestors 'none'");
  expect(headers.get("referrer-policy")).toBe("no-referrer");
  expect(headers.get("x-powered-by")).toBeNull();
});
