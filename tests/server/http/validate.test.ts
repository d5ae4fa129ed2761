import { describe, expect, it } from "vitest";
import { z } from "zod";
import { validate } from "../../../server/http/validate.ts";

const schema = z.object({
  name: z.string().trim().max(3),
  also: z.array(z.string()).max(2),
  before: z.coerce.number().positive(),
  title: z.string().min(1, "a study needs a title").default("t"),
});

const said = (value: unknown) => {
  try {
    validate(schema, value);
  } catch (error) {
    return (error as Error).message;
  }
  return "nothing";
};

describe("a body that is refused for its size", () => {
  it.each([
    [{ name: "four", also: [], before: 1 }, "name: has 4 characters, and takes at most 3"],
    [{ name: "a", also: ["a", "b", "c"], before: 1 }, "also: has 3 entries, and takes at most 2"],
    [{ name: "a", also: [], before: -1 }, "before: is -1, and must be above 0"],
    [{ name: "a", also: [], before: "-12" }, "before: is -12, and must be above 0"],
    [{ name: "a", also: [], before: 1, title: "" }, "title: a study needs a title"],
  ])("names the key and both numbers: %j", (value, sentence) => {
    expect(said(value)).toBe(sentence);
  });
});
