import { describe, expect, it } from "vitest";
import { sourcesAfterRenaming } from "../../../src/app/workspace/rename.ts";
import type { Standing } from "../../../src/app/workspace/standing.ts";
import { writtenStanding } from "../../../src/app/workspace/written-standing.ts";
import { studyCells } from "../study-sources.ts";

const [survey, base] = studyCells();
const argument = { id: "t", name: "argument", kind: "text", order: "z", source: "On {base: rows} rows." };

function standing(cell: Standing["cell"], more: Partial<Standing> = {}): Standing {
  return { cell, kind: "system", state: "current", problems: [], reads: [], readBy: [], ...more };
}
const written = (source: string, more: Partial<Standing> = {}) =>
  standing({ ...argument, source }, { kind: "text", reads: ["base"], ...more });

describe("a text cell in the study", () => {
  it("is as current as what it quotes is here, and has no finding to fetch", () => {
    const told = written(argument.source, { state: "draft", fingerprint: "f", because: "anything" });
    expect(writtenStanding(told, [standing(base)])).not.toHaveProperty("fingerprint");
    expect(writtenStanding(told, [standing(base)])).toMatchObject({ state: "current" });
    expect(writtenStanding(told, [standing(base, { state: "estimating" })]).state).toBe("out of date");
    expect(writtenStanding(told, [standing(survey)]).state).toBe("out of date");
  });

  it("is a draft while it is empty, and failed while a quotation leads nowhere", () => {
    expect(writtenStanding(written(" \n"), [standing(base)])).toMatchObject({
      state: "draft",
      because: "nothing is written yet",
    });
    const problems = [{ sentence: "No cell is called bass." }];
    expect(writtenStanding(written("{bass: rows}", { problems }), [standing(base)]).state).toBe("failed");
  });

  it("follows a cell that is renamed", () => {
    const changed = sourcesAfterRenaming("base", "exact", [...studyCells(), argument]);
    expect(changed.get("t")).toBe("On {exact: rows} rows.");
    expect(changed.get("m")).toContain("system: exact");
  });
});
