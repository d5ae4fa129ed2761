import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { type OpenDatabase, openDatabase } from "../../server/db/client.ts";
import { loadUpdates } from "../../server/db/queries/documents.ts";
import { addCell } from "../../server/sync/index.ts";
import { openAs, until } from "../support/sync-clients.ts";
import { fillDatabase, type RunningSync, STUDY, startSyncServer } from "../support/sync-server.ts";
import { temporaryFolder } from "../support/temporary.ts";

describe("two people in one study", () => {
  let folder: ReturnType<typeof temporaryFolder>;
  let open: OpenDatabase;
  let server: RunningSync;
  const pages: ReturnType<typeof openAs>[] = [];

  const page = async (...given: [Parameters<typeof openAs>[0], Parameters<typeof openAs>[2]?]) => {
    const opened = openAs(given[0], server, given[1]);
    pages.push(opened);
    await until(() => opened.snapshot().connection.state === "connected", "the page never connected");
    return opened;
  };

  beforeEach(async () => {
    folder = temporaryFolder();
    open = openDatabase(`${folder.path}/sync.sqlite`);
    fillDatabase(open);
    server = await startSyncServer(open);
    await server.sync.edit(STUDY, (doc) => {
      addCell(doc, { id: "survey", name: "survey", kind: "data", source: "upload: drinks.csv\n" });
    });
  });

  afterEach(async () => {
    await Promise.all(pages.splice(0).map((opened) => opened.close()));
    await server.close();
    open.close();
    folder.remove();
  });

  it("type into one source at once, and read the same", async () => {
    const [ilse, tomas] = [await page("ilse"), await page("tomas")];
    const [a, b] = [ilse.sourceOf("survey")!, tomas.sourceOf("survey")!];
    a.insert(0, "time: week\n");
    b.insert(b.length, "weight: w\n");
    await until(() => a.toString() === b.toString() && a.length > 30, "the texts differ");
    expect(ilse.snapshot().cells[0].source).toBe("time: week\nupload: drinks.csv\nweight: w\n");
    await until(() => ilse.snapshot().stored.everything && tomas.snapshot().stored.everything, "not all stored");
    expect(server.sync.sourcesOf(STUDY)[0].source).toBe(a.toString());
    await until(() => server.changed.includes(`${STUDY} tomas`) || server.changed.includes(`${STUDY} ilse`), "untold");
  });

  it("add, move, rename and remove cells, and undo only their own", async () => {
    const [ilse, tomas] = [await page("ilse"), await page("tomas")];
    const base = ilse.addCell({ name: "base", kind: "system", source: "data: survey\n" });
    await until(() => tomas.snapshot().cells.length === 2, "the cell did not come");
    const matrix = tomas.addCell({ name: "matrix", kind: "slutsky", source: "system: base\n" }, null);
    await until(() => ilse.snapshot().cells.length === 3, "the cell did not come back");
    expect(ilse.snapshot().cells.map(({ name }) => name)).toEqual(["matrix", "survey", "base"]);
    ilse.moveCell(matrix, base);
    ilse.renameCell(base, "base system");
    ilse.removeCell("survey");
    await until(
      () =>
        tomas
          .snapshot()
          .cells.map(({ name }) => name)
          .join() === "base system,matrix",
      "not followed",
    );
    ilse.undo.undo();
    await until(() => tomas.snapshot().cells.length === 3, "the undoing did not come");
    expect(tomas.snapshot().cells[0]).toMatchObject({ id: "survey", source: "upload: drinks.csv\n" });
    tomas.undo.undo();
    await until(() => ilse.snapshot().cells.length === 2, "Tomás's own addition was not undone");
    expect(ilse.snapshot().cells.map(({ name }) => name)).toEqual(["survey", "base system"]);
  });

  it("turn a source into another without disturbing what the other writes in it", async () => {
    const [ilse, tomas] = [await page("ilse"), await page("tomas")];
    ilse.replaceSource("survey", "upload: drinks.csv\nweight: w\ntime: week\n");
    await until(() => tomas.snapshot().cells[0].source.includes("time"), "not followed");
    tomas.sourceOf("survey")!.insert(0, "# ours\n");
    ilse.replaceSource("survey", "upload: drinks.csv\nweight: weight\ntime: week\n");
    const both = "# ours\nupload: drinks.csv\nweight: weight\ntime: week\n";
    await until(
      () => ilse.snapshot().cells[0].source === both && tomas.snapshot().cells[0].source === both,
      () => JSON.stringify(ilse.snapshot().cells[0].source),
    );
  });

  it("see each other: who, in what colour, where, typing", async () => {
    const [ilse, tomas, vera] = [await page("ilse"), await page("tomas"), await page("vera")];
    await until(() => vera.snapshot().people.length === 3, "someone is missing");
    expect(vera.snapshot().people.map(({ name, role }) => `${name}, ${role}`)).toEqual([
      "Ilse Marchetti, owner",
      "Tomás Adeyemi, coauthor",
      "Vera Okonkwo, reader",
    ]);
    ilse.goTo("survey");
    ilse.sourceOf("survey")!.insert(0, "#");
    const seen = () => tomas.snapshot().whereabouts.find(({ person }) => person.id === "ilse");
    await until(() => seen()?.cell === "survey" && seen()?.typing === true, "not seen in the cell");
    await until(() => vera.snapshot().whereabouts.length === 2, "a reader sees where they are");
    expect(tomas.snapshot().whereabouts.some(({ person }) => person.id === "vera")).toBe(false);
    await ilse.close();
    await until(() => tomas.snapshot().whereabouts.length === 0, "still seen after leaving");
    await until(() => tomas.snapshot().people.length === 2, "still present after leaving");
  });

  it("keep edits through a lost connection, say so, and merge them on return", async () => {
    const ilse = await page("ilse");
    const tomas = await page("tomas", { now: () => 1_700_000_000_000 });
    const port = Number(new URL(server.origin).port);
    await server.close();
    await until(() => tomas.snapshot().connection.state === "working alone", "the loss was not noticed");
    tomas.sourceOf("survey")!.insert(0, "# by Tomás\n");
    tomas.sourceOf("survey")!.delete(0, 1);
    ilse.sourceOf("survey")!.insert(18, " # by Ilse");
    expect(tomas.snapshot().connection).toEqual({ state: "working alone", since: 1_700_000_000_000, editsKept: 2 });
    expect(tomas.snapshot().stored).toEqual({ everything: false, unstored: 2 });
    expect(tomas.snapshot().people.map(({ id }) => id)).toEqual(["tomas"]);
    expect(tomas.snapshot().whereabouts).toEqual([]);
    server = await startSyncServer(open, { port });
    const merged = " by Tomás\nupload: drinks.csv # by Ilse\n";
    for (const one of [ilse, tomas]) {
      await until(
        () => one.snapshot().cells[0].source === merged,
        () => one.snapshot().cells[0].source,
      );
      await until(() => one.snapshot().stored.everything, "not all stored");
      expect(one.snapshot().connection).toEqual({ state: "connected" });
    }
    expect(server.sync.sourcesOf(STUDY)[0].source).toBe(merged);
  });

  it("a reader's page follows and tries nothing", async () => {
    const [ilse, vera] = [await page("ilse"), await page("vera")];
    expect(vera.snapshot().readOnly).toBe(true);
    expect(() => vera.addCell({ name: "mine", kind: "data", source: "" })).toThrow("A reader cannot change the study.");
    vera.sourceOf("survey")!.insert(0, "forged ");
    ilse.sourceOf("survey")!.insert(0, "# live\n");
    await until(() => vera.snapshot().cells[0].source.includes("# live"), "the edit did not come");
    expect(server.sync.sourcesOf(STUDY)[0].source).toBe("# live\nupload: drinks.csv\n");
    expect(loadUpdates(open.db, STUDY)).toHaveLength(2);
  });

  it("publishes the status to those there and to those who come later", async () => {
    const ilse = await page("ilse");
    const status = { studyId: STUDY, cells: [] };
    server.sync.publish(STUDY, status);
    await until(() => ilse.snapshot().status !== undefined, "no status");
    const tomas = await page("tomas");
    await until(() => tomas.snapshot().status !== undefined, "no status on joining");
    expect(tomas.snapshot().status).toEqual(status);
  });
});
