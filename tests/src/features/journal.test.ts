import { describe, expect, it } from "vitest";
import { INSTALLATION_ACTIONS, STUDY_ACTIONS } from "../../../shared/schemas/journal.ts";
import { entryInWords } from "../../../src/features/journal/journal-words.ts";

const entry = { id: 1, at: new Date(0).toISOString(), by: "Ilse Marchetti" };

describe("an entry of the journal", () => {
  it.each([
    [
      { ...entry, action: "person invited", subject: "petra@vihe.example, as reader" } as const,
      "Ilse Marchetti invited petra@vihe.example, as reader.",
    ],
    [{ ...entry, action: "person left" } as const, "Ilse Marchetti left."],
    [
      { id: 1, at: entry.at, action: "invitation refused", subject: "a@b.example" } as const,
      "Whoever had the link refused the invitation sent to a@b.example.",
    ],
    [{ id: 1, at: entry.at, action: "study deleted for good" } as const, "A study was deleted for good."],
    [{ ...entry, action: "study deleted for good" } as const, "A study was deleted for good, by Ilse Marchetti."],
  ])("%# is a sentence", (one, words) => expect(entryInWords(one)).toBe(words));

  it("of any kind has its words", () => {
    for (const action of [...STUDY_ACTIONS, ...INSTALLATION_ACTIONS]) {
      expect(entryInWords({ ...entry, action, subject: "something" })).toMatch(/^\p{Lu}.* .*\.$/u);
    }
  });
});
