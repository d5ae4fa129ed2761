import { beforeEach, describe, expect, it } from "vitest";
import { z } from "zod";
import { ApiRefusal, unreachable } from "../../../src/lib/api.ts";
import { forgetKeptAnswers, orKept } from "../../../src/lib/kept-answers.ts";

const title = z.strictObject({ title: z.string() });
const LEVY = { title: "Levy" };
const refusal = (status: number) => new ApiRefusal(status, "", "No.");
const asked = (answer: Promise<typeof LEVY>) => orKept("study", title, answer);
const away = () => asked(Promise.reject(unreachable()));

beforeEach(async () => {
  localStorage.clear();
  expect(await asked(Promise.resolve(LEVY))).toEqual(LEVY);
});

describe("an answer that is kept", () => {
  it.each([0, 502, 503, 504])("stands in while the installation is away (%i)", async (status) => {
    expect(await asked(Promise.reject(refusal(status)))).toEqual(LEVY);
  });

  it.each([403, 404])("is forgotten once the installation says no (%i)", async (status) => {
    await expect(asked(Promise.reject(refusal(status)))).rejects.toThrow("No.");
    await expect(away()).rejects.toThrow("does not answer");
  });

  it("hides no failure of the installation", async () => {
    await expect(asked(Promise.reject(refusal(500)))).rejects.toThrow("No.");
    expect(await away()).toEqual(LEVY);
  });

  it("is gone with all others when the session has ended, or on signing out", async () => {
    await expect(orKept("me", title, Promise.reject(refusal(401)))).rejects.toThrow("No.");
    await expect(away()).rejects.toThrow("does not answer");
    await asked(Promise.resolve(LEVY));
    forgetKeptAnswers();
    await expect(away()).rejects.toThrow("does not answer");
  });

  it("is not believed when it is not of its shape", async () => {
    localStorage.setItem("tangency-kept/study", '{"title":3}');
    await expect(away()).rejects.toThrow("does not answer");
  });
});
