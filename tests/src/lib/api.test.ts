import { afterEach, describe, expect, it, vi } from "vitest";
import { z } from "zod";
import { ApiRefusal, ask, refusalOf, sentenceOf } from "../../../src/lib/api.ts";
import { answering, Refused } from "../answering.tsx";

afterEach(() => vi.unstubAllGlobals());

describe("asking the API", () => {
  it("returns the answer as its schema reads it, and refuses one of another shape", async () => {
    answering({ "GET /api/thing": { size: "3" } });
    await expect(ask({ path: "/api/thing", answer: z.object({ size: z.coerce.number() }) })).resolves.toEqual({
      size: 3,
    });
    await expect(ask({ path: "/api/thing", answer: z.object({ size: z.number() }) })).rejects.toThrow();
  });

  it("tells a refusal with its sentence, its status and its problems", async () => {
    const problem = { sentence: "Row 3 has 4 cells, the header has 5.", row: 3 };
    answering({ "POST /api/thing": new Refused(422, "The file cannot be read.", [problem]) });
    const refusal = await ask({ method: "POST", path: "/api/thing", body: {} }).catch((error: unknown) => error);
    expect(refusal).toBeInstanceOf(ApiRefusal);
    expect(refusal).toMatchObject({ status: 422, message: "The file cannot be read.", problems: [problem] });
  });

  it("says so when nothing answers", async () => {
    vi.stubGlobal("fetch", () => Promise.reject(new TypeError("failed")));
    await expect(ask({ path: "/api/thing" })).rejects.toThrow(/does not answer/);
  });

  it("finds a sentence in a refusal that is worded otherwise, and makes none of internal errors", () => {
    expect(refusalOf(422, '{"message":"User already exists"}').message).toBe("User already exists.");
    expect(refusalOf(502, "<html>").message).toBe("The installation answered 502 and gave no reason.");
    expect(sentenceOf(new TypeError("x is undefined"))).not.toContain("undefined");
  });
});
