import { afterEach, beforeEach, describe, expect, it } from "vitest";
import * as Y from "yjs";
import type { StudyConnection } from "../../src/sync/study.ts";
import { openStudy } from "../../src/sync/study.ts";

/** A fake of the line: what one writes is in the other's document at once. */
function joined(): [StudyConnection, StudyConnection] {
  const socket = class {
    close() {}
  } as unknown as typeof WebSocket;
  const open = (id: string) =>
    openStudy("study", { id }, "coauthor", { server: "ws://nowhere.example", WebSocket: socket, keeping: null });
  const [ilse, tomas] = [open("ilse"), open("tomas")];
  for (const [from, to] of [
    [ilse, tomas],
    [tomas, ilse],
  ]) {
    from.doc.on("update", (update: Uint8Array, origin: unknown) => {
      if (origin !== "line") Y.applyUpdate(to.doc, update, "line");
    });
  }
  return [ilse, tomas];
}

let ilse: StudyConnection;
let tomas: StudyConnection;
let survey: string;
const TYPING = { editor: true };

beforeEach(() => {
  [ilse, tomas] = joined();
  survey = ilse.addCell({ name: "survey", kind: "data", source: "upload: drinks.csv\n" });
  ilse.undo.clear();
  for (const person of [ilse, tomas]) person.undo.addTrackedOrigin(TYPING);
});
afterEach(() => Promise.all([ilse.close(), tomas.close()]));

const names = () => tomas.snapshot().cells.map(({ name }) => name);
const source = (id = survey) => tomas.snapshot().cells.find((cell) => cell.id === id)?.source;
const type = (who: StudyConnection, at: number, words: string, id = survey) => {
  who.undo.stopCapturing();
  who.doc.transact(() => who.sourceOf(id)?.insert(at, words), TYPING);
};
const undone = (who = ilse) => who.snapshot().undone?.sentence;

describe("undoing", () => {
  it("goes back over typing, forms, adding, renaming, moving and removing, the last first, and says what", () => {
    type(ilse, 0, "# ours\n");
    ilse.replaceSource(survey, "# ours\nupload: drinks.csv\nweight: w\n");
    const base = ilse.addCell({ name: "base", kind: "system", source: "data: survey\n" });
    ilse.atOnce("renaming", () => {
      ilse.renameCell(survey, "homes");
      ilse.replaceSource(base, "data: homes\n");
    });
    ilse.moveCell(base, null);
    ilse.removeCell(survey);
    expect(names()).toEqual(["base"]);
    const steps = [
      ["Undone: removing homes.", ["base", "homes"]],
      ["Undone: moving base.", ["homes", "base"]],
      ["Undone: renaming homes.", ["survey", "base"]],
      ["Undone: adding base.", ["survey"]],
      ["Undone: changing survey.", ["survey"]],
      ["Undone: typing in survey.", ["survey"]],
    ] as const;
    for (const [sentence, left] of steps) {
      ilse.undoStep();
      expect([undone(), names()]).toEqual([sentence, left]);
    }
    expect(source()).toBe("upload: drinks.csv\n");
    ilse.undoStep();
    expect(ilse.snapshot().undone).toEqual({ sentence: "There is nothing of yours left to undo here." });
  });

  it("does again what was undone, in the same order", () => {
    const base = ilse.addCell({ name: "base", kind: "system", source: "" });
    type(ilse, 0, "data: survey\n", base);
    ilse.undoStep();
    ilse.undoStep();
    expect(ilse.snapshot().undone).toEqual({ sentence: "Undone: adding base.", again: "redo" });
    ilse.redoStep();
    ilse.redoStep();
    expect([undone(), source(base)]).toEqual(["Done again: typing in base.", "data: survey\n"]);
    expect(ilse.snapshot().undone?.cellId).toBe(base);
  });

  it("never touches what another did meanwhile, even in the same words", () => {
    type(ilse, 0, "form: aids\n");
    type(tomas, 6, "la-");
    tomas.addCell({ name: "matrix", kind: "slutsky", source: "" });
    tomas.renameCell(survey, "homes");
    ilse.undoStep();
    expect([source(), names()]).toEqual(["la-upload: drinks.csv\n", ["homes", "matrix"]]);
    ilse.undoStep();
    expect(undone()).toMatch(/nothing of yours/);
    tomas.undoStep();
    expect([undone(tomas), names()]).toEqual(["Undone: renaming homes.", ["survey", "matrix"]]);
  });

  it("keeps another's name when both renamed a cell", () => {
    ilse.renameCell(survey, "purchases");
    tomas.renameCell(survey, "homes");
    ilse.undoStep();
    expect(names()).toEqual(["homes"]);
  });

  it("refuses to take a cell away that holds another's words by now", () => {
    const base = ilse.addCell({ name: "base", kind: "system", source: "data: survey\n" });
    type(tomas, 0, "form: aids\n", base);
    ilse.undoStep();
    expect(undone()).toBe("base holds the words of others by now: it stays. Remove it yourself if that is meant.");
    expect(source(base)).toBe("form: aids\ndata: survey\n");
    ilse.removeCell(base);
    ilse.undoStep();
    expect(source(base)).toBe("form: aids\ndata: survey\n");
    type(tomas, 0, "# more\n", base);
    ilse.redoStep();
    expect([undone(), source(base)]).toEqual([
      "base holds the words of others by now: it stays. Remove it yourself if that is meant.",
      "# more\nform: aids\ndata: survey\n",
    ]);
  });

  it("within a cell goes back over that cell's steps only, and not past its adding", () => {
    const base = ilse.addCell({ name: "base", kind: "system", source: "" });
    type(ilse, 0, "data: survey\n", base);
    type(ilse, 0, "# ours\n");
    ilse.undoStep(base);
    expect([source(base), source()]).toEqual(["", "# ours\nupload: drinks.csv\n"]);
    ilse.undoStep(base);
    expect([undone(), names()]).toEqual(["There is nothing of yours left to undo here.", ["survey", "base"]]);
    ilse.redoStep(base);
    expect(source(base)).toBe("data: survey\n");
    ilse.undoStep();
    expect(undone()).toBe("Undone: typing in base.");
    ilse.undoStep();
    expect([undone(), source()]).toEqual(["Undone: typing in survey.", "upload: drinks.csv\n"]);
  });
});

describe("returning to a state", () => {
  it("restores ids, names, order and sources, touches nothing that is the same, and is one step back", () => {
    const base = ilse.addCell({ name: "base", kind: "system", source: "data: survey\nform: aids\n" });
    const kept = tomas.snapshot().cells;
    ilse.removeCell(survey);
    tomas.replaceSource(base, "data: homes\nform: quaids\n");
    tomas.renameCell(base, "first");
    tomas.addCell({ name: "later", kind: "slutsky", source: "" }, null);
    const left = tomas.snapshot().cells;
    ilse.returnTo(kept, "First draft");
    expect(tomas.snapshot().cells).toEqual(kept);
    let updates = 0;
    ilse.doc.on("update", () => updates++);
    ilse.returnTo(kept, "First draft");
    expect(updates).toBe(0);
    ilse.undoStep();
    expect(undone()).toBe("Undone: returning to First draft.");
    expect(tomas.snapshot().cells).toEqual(left);
  });

  it("undone, gives back letter by letter what another typed meanwhile", () => {
    const base = ilse.addCell({ name: "base", kind: "system", source: "data: survey\nform: la-aids\nx: 1\n" });
    const kept = ilse.snapshot().cells;
    const text = tomas.sourceOf(base);
    tomas.doc.transact(() => text?.delete(13, 13), TYPING);
    for (const [place, letter] of [..."form: les"].entries()) {
      tomas.doc.transact(() => text?.insert(13 + place, letter), TYPING);
    }
    const typed = "data: survey\nform: les\nx: 1\n";
    expect(source(base)).toBe(typed);
    ilse.returnTo(kept, "First draft");
    expect(source(base)).toBe("data: survey\nform: la-aids\nx: 1\n");
    ilse.undoStep();
    expect([source(base), ilse.sourceOf(base)?.toString()]).toEqual([typed, typed]);
  });
});
