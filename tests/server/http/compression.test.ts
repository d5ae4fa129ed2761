import { afterAll, beforeAll, expect, test } from "vitest";
import { type Application, startApplication } from "../../support/application.ts";

let application: Application;

beforeAll(async () => {
  application = await startApplication();
});
afterAll(() => application.close());

test("a long answer travels compressed, and reads the same", async () => {
  const ilse = await application.person("Ilse");
  for (let i = 0; i < 12; i++)
    await ilse.ask("POST", "/api/studies", { title: `Study ${i}`, lede: "A levy. ".repeat(30) });

  const answer = await ilse.ask("GET", "/api/studies", undefined, { "accept-encoding": "gzip" });

  expect(answer.headers.get("content-encoding")).toBe("gzip");
  expect(answer.body).toHaveLength(12);
});
