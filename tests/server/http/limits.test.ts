import type { AddressInfo } from "node:net";
import express from "express";
import { afterAll, beforeAll, expect, test } from "vitest";
import { answerErrors } from "../../../server/http/errors.ts";
import { limitFailedSignIns } from "../../../server/http/limits.ts";

const locked: string[] = [];
const app = express();
app.post(
  "/",
  express.json(),
  limitFailedSignIns((email) => locked.push(email)),
  (request, response) => {
    response.status(request.body.right ? 200 : 401).end();
  },
);
app.use(answerErrors);
let server: ReturnType<typeof app.listen>;

beforeAll(async () => {
  await new Promise<void>((ready) => {
    server = app.listen(0, "127.0.0.1", () => ready());
  });
});
afterAll(() => void server.close());

async function signIn(email: string, right: boolean): Promise<number> {
  const { port } = server.address() as AddressInfo;
  const headers = { "content-type": "application/json" };
  const answer = await fetch(`http://127.0.0.1:${port}/`, {
    method: "POST",
    headers,
    body: JSON.stringify({ email, right }),
  });
  return answer.status;
}

test("fifty failed sign-ins lock an address, told once, and no other; those that succeed do not count", async () => {
  for (let i = 0; i < 60; i++) expect(await signIn("petra@vihe.example", true)).toBe(200);
  for (let i = 0; i < 50; i++) expect(await signIn("petra@vihe.example", false)).toBe(401);
  expect(locked).toEqual([]);
  for (let i = 0; i < 3; i++) expect(await signIn("Petra@vihe.example", true)).toBe(429);
  expect(locked).toEqual(["petra@vihe.example"]);
  expect(await signIn("tomas@vihe.example", true)).toBe(200);
});
