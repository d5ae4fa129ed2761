import { mkdirSync, writeFileSync } from "node:fs";
import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import { join } from "node:path";
import express from "express";
import { afterAll, beforeAll, expect, test } from "vitest";
import { answerErrors } from "../../../server/http/errors.ts";
import { pages } from "../../../server/http/pages.ts";
import { temporaryFolder } from "../../support/temporary.ts";

const folder = temporaryFolder();
const server = createServer(express().use(pages(folder.path)).use(answerErrors));
let origin = "";

beforeAll(async () => {
  mkdirSync(join(folder.path, "assets"));
  writeFileSync(join(folder.path, "assets", "index-a1b2c3.js"), "export {}");
  await new Promise<void>((ready) => server.listen(0, "127.0.0.1", ready));
  origin = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
});
afterAll(() => {
  server.close();
  folder.remove();
});

const get = (path: string) => fetch(`${origin}${path}`);

test("pages that are not built say what builds them", async () => {
  const answer = await get("/");
  expect([answer.status, (await answer.json()).error.sentence]).toEqual([
    404,
    expect.stringContaining("npm run build"),
  ]);
});

test("every address of a page gets the page, asked for each time", async () => {
  writeFileSync(join(folder.path, "index.html"), "<!doctype html><title>Tangency</title>");
  for (const path of ["/", "/studies/abc/cells/def", "/referee/some-token"]) {
    const answer = await get(path);
    expect([answer.status, answer.headers.get("cache-control")]).toEqual([200, "no-cache"]);
    expect(await answer.text()).toContain("<title>Tangency");
  }
});

test("files named by their content are kept for ever; one that is missing is no page", async () => {
  const file = await get("/assets/index-a1b2c3.js");
  expect([file.status, file.headers.get("cache-control")]).toEqual([200, "public, max-age=31536000, immutable"]);
  expect((await get("/assets/index-old.js")).status).toBe(404);
  expect((await get("/assets/..%2f..%2fpackage.json")).status).toBeGreaterThanOrEqual(400);
});
