import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { fireEvent, render, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { createMemoryRouter, Outlet, RouterProvider } from "react-router-dom";
import { afterEach, describe, expect, it, vi } from "vitest";
import * as Y from "yjs";
import type { Role, StudySummary } from "../../../shared/schemas/resources.ts";
import type { CellStatus } from "../../../shared/schemas/status.ts";
import { fingerprintCells } from "../../../shared/study/fingerprints.ts";
import { resolveCells } from "../../../shared/study/resolve.ts";
import WorkspacePage from "../../../src/app/pages/workspace.tsx";
import type { OpenStudy } from "../../../src/app/workspace/open-study.ts";
import { chooseLetterKeys } from "../../../src/lib/preferences.ts";
import { openStudy, type StudyConnection } from "../../../src/sync/study.ts";
import { sampleSlutsky, sampleSystem } from "../../support/sample-findings.ts";
import { type Asked, answering } from "../answering.tsx";
import { studyCells, upload } from "../study-sources.ts";

// Nothing is laid out here, and the editor asks where its text stands.
Range.prototype.getClientRects = () => [] as unknown as DOMRectList;

/** A socket that never opens: everything here is what a page does by itself. */
class Silent extends EventTarget {
  readyState = 0;
  close() {}
  send() {}
}

const me = { id: "i", name: "Ilse Marchetti", email: "ilse.marchetti@vihe.example" };
const study: StudySummary = {
  id: "s",
  title: "Food demand in Velmark",
  lede: "Who would bear a levy on sweet drinks?",
  role: "owner",
  people: [{ ...me, role: "owner" }],
  changedAt: "2031-03-12T13:00:00.000Z",
  cells: [],
};

function fill(connection: StudyConnection) {
  const cells = connection.doc.getMap("cells");
  connection.doc.transact(() => {
    for (const { id, source, ...words } of studyCells()) {
      const cell = new Y.Map<unknown>(Object.entries(words));
      cell.set("source", new Y.Text(source));
      cells.set(id, cell);
    }
  });
}

const found = fingerprintCells(resolveCells(studyCells(), [upload]), [upload]);
const at = "2031-03-12T13:52:00.000Z";

/** All current, but for what a test says of a cell. */
function statusWith(changes: Readonly<Record<string, Partial<CellStatus>>> = {}) {
  const cells = resolveCells(studyCells(), [upload]).map(({ id, name, kind, reads, source }) => ({
    cellId: id,
    name,
    kind,
    reads,
    state: "current",
    fingerprint: found.get(id),
    last: { fingerprint: found.get(id), source, at, tookMs: 1600 },
    problems: [],
    ...changes[name],
  }));
  return { studyId: "s", cells };
}

const opened: StudyConnection[] = [];
afterEach(async () => {
  await Promise.all(opened.splice(0).map((connection) => connection.close()));
  vi.unstubAllGlobals();
  chooseLetterKeys(true);
});

async function open(
  role: Role = "owner",
  answers: Record<string, unknown> = {},
): Promise<{
  asked: Asked[];
  connection: StudyConnection;
  user: ReturnType<typeof userEvent.setup>;
}> {
  const asked = answering({
    "GET /api/studies/s/status": statusWith(),
    "GET /api/studies/s/uploads": [upload],
    "GET /api/studies/s/remarks": [],
    [`GET /api/studies/s/findings/${found.get("b")}`]: { finding: sampleSystem(), foundAt: at, tookMs: 1600 },
    [`GET /api/studies/s/findings/${found.get("m")}`]: { finding: sampleSlutsky(), foundAt: at, tookMs: 40 },
    ...answers,
  });
  const connection = openStudy("s", me, role, {
    WebSocket: Silent as unknown as typeof WebSocket,
    keeping: null,
    server: "ws://nowhere.example",
  });
  opened.push(connection);
  fill(connection);
  const context: OpenStudy = { study: { ...study, role }, me, connection, readOnly: role === "reader" };
  const router = createMemoryRouter(
    [{ element: <Outlet context={context} />, children: [{ path: "*", element: <WorkspacePage /> }] }],
    { initialEntries: ["/studies/s"] },
  );
  render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  await band("matrix");
  return { asked, connection, user: userEvent.setup() };
}

const band = (name: string) => screen.findByRole("region", { name: new RegExp(`^${name} `) });
const names = () =>
  screen.getAllByRole("region", { name: / (data|system|slutsky)$/ }).map((one) => one.textContent?.split(" ")[0]);

describe("a study", () => {
  it("has a band for each cell: source on the left, finding on the right", async () => {
    await open();
    const base = await band("base");
    expect(await within(base).findByText(/Meat & fish is a luxury/i)).toBeInTheDocument();
    expect(within(base).getByText(/^since .*, took 1.6 s$/)).toBeInTheDocument();
    expect(within(base).getByRole("link", { name: "Open of base" })).toHaveAttribute("href", "/studies/s/cells/b");
    expect(within(base).getByRole("button", { name: "Text", pressed: true })).toBeInTheDocument();
    expect(within(await band("matrix")).getByRole("button", { name: "Form", pressed: true })).toBeInTheDocument();
    expect(screen.getByText("3 current")).toBeInTheDocument();
    expect(screen.queryByRole("button", { name: /Bring up to date/ })).not.toBeInTheDocument();
  });

  it("shows no finding under a source that did not ask for it", async () => {
    const { connection } = await open();
    const base = await band("base");
    await within(base).findByText(/Meat & fish is a luxury/i);
    connection.replaceSource("b", "data: survey\nform: les\n");
    await waitFor(() => expect(base).toHaveTextContent("form changed from aids to les"));
    expect(within(base).queryByText(/is a luxury/i)).not.toBeInTheDocument();
    expect(await band("matrix")).toHaveTextContent("base changed");
  });

  it("keeps the last finding under its own source, and goes back to it", async () => {
    const { connection, user } = await open();
    connection.replaceSource("b", "data: survey\nform: les\n");
    const base = await band("base");
    await user.click(await within(base).findByRole("button", { name: "Look at the aids finding" }));
    const kept = within(base).getByRole("region", { name: "The last finding, under its own specification" });
    expect(kept).toHaveTextContent("Not this specification's.");
    expect(kept).toHaveTextContent("form: aids");
    expect(await within(kept).findByText(/is a luxury/i)).toBeInTheDocument();
    await user.click(within(base).getByRole("button", { name: "Return to aids" }));
    expect(connection.sourceOf("b")?.toString()).toContain("form: aids");
    expect(await within(base).findByText("Current")).toBeInTheDocument();
  });

  it("says what is wrong in a sentence, with the nearest valid word as a button", async () => {
    const { connection, user } = await open();
    connection.replaceSource("b", "data: survay\nform: aids\n");
    const base = await band("base");
    await user.click(await within(base).findByRole("button", { name: "Use survey" }));
    expect(connection.sourceOf("b")?.toString()).toBe("data: survey\nform: aids\n");
  });

  it("offers to estimate, with about how long, one cell or all that wait", async () => {
    const draft = { state: "draft" as const, fingerprint: found.get("b"), last: undefined, aboutMs: 21_000 };
    const { asked, user } = await open("owner", {
      "GET /api/studies/s/status": statusWith({ base: draft }),
      "POST /api/studies/s/cells/b/estimation": statusWith(),
      "POST /api/studies/s/estimations": statusWith(),
    });
    const base = await band("base");
    expect(await within(base).findByText("never estimated; about 20 s")).toBeInTheDocument();
    await user.click(within(base).getByRole("button", { name: "Estimate aids, about 20 s" }));
    await user.click(screen.getByRole("button", { name: "Bring up to date: 1 cell, about 20 s" }));
    expect(asked.filter(({ method }) => method === "POST").map(({ path }) => path)).toEqual([
      "/api/studies/s/cells/b/estimation",
      "/api/studies/s/estimations",
    ]);
  });

  it("tells how far an estimation is, and cancels it from two seconds on", async () => {
    const progress = { step: "iterating", iteration: 7, logLikelihood: 42_061.34, elapsedMs: 2_400, aboutMs: 20_000 };
    const { asked, user } = await open("owner", {
      "GET /api/studies/s/status": statusWith({ base: { state: "estimating", progress } }),
      "DELETE /api/studies/s/cells/b/estimation": statusWith(),
    });
    const base = await band("base");
    expect(
      await within(base).findByText(/^iteration 7, log-likelihood 42,061.3; 0:02 of about 0:20$/),
    ).toBeInTheDocument();
    await user.click(within(base).getByRole("button", { name: "Cancel" }));
    expect(asked.some(({ method }) => method === "DELETE")).toBe(true);
  });

  it("adds a cell that reads the last one of the kind it needs", async () => {
    const { connection, user } = await open();
    await user.click(screen.getByRole("button", { name: "slutsky" }));
    await band("matrix 2");
    expect(connection.snapshot().cells.at(-1)?.source).toContain("system: base");
  });

  it("renames a cell, and those that read it go on reading it", async () => {
    const { connection, user } = await open();
    await user.click(within(await band("base")).getByRole("button", { name: "More for base" }));
    await user.click(await screen.findByRole("menuitem", { name: "Rename" }));
    const field = await screen.findByRole("textbox", { name: "Name of base" });
    await user.clear(field);
    await user.type(field, "survey");
    expect(screen.getByText("Another cell is called survey already.")).toBeInTheDocument();
    await user.clear(field);
    await user.type(field, "exact{Enter}");
    await band("exact");
    expect(connection.sourceOf("m")?.toString()).toContain("system: exact");
    expect(await within(await band("matrix")).findByText("Current")).toBeInTheDocument();
  });

  it("renames a good in its form, and what names the good follows; one step back undoes it all", async () => {
    const { connection, user } = await open();
    const system = "data: survey\nform: aids\ndropped: dairy\n";
    const text = connection.addCell({ name: "argument", kind: "text", source: "Of {base: eta, dairy}." });
    connection.replaceSource("b", system);
    const before = connection.sourceOf("s")?.toString();
    const field = await within(await band("survey")).findByRole("textbox", { name: "Name of dairy" });
    await user.clear(field);
    await user.type(field, "milk{Enter}");
    await waitFor(() => expect(connection.sourceOf("s")?.toString()).toContain("  milk: {price: p_dairy"));
    expect(connection.sourceOf("b")?.toString()).toBe(system.replace("dairy", "milk"));
    expect(connection.sourceOf(text)?.toString()).toBe("Of {base: eta, milk}.");
    connection.undoStep();
    expect(connection.snapshot().undone?.sentence).toBe("Undone: renaming the good dairy.");
    expect(connection.sourceOf("s")?.toString()).toBe(before);
    expect(connection.sourceOf("b")?.toString()).toBe(system);
    expect(connection.sourceOf(text)?.toString()).toBe("Of {base: eta, dairy}.");
  });

  it("moves and removes cells, and brings a removed one back to its place", async () => {
    const { user } = await open();
    await user.click(within(await band("matrix")).getByRole("button", { name: "More for matrix" }));
    await user.click(await screen.findByRole("menuitem", { name: "Move up" }));
    await waitFor(() => expect(names()).toEqual(["survey", "matrix", "base"]));
    await user.click(within(await band("matrix")).getByRole("button", { name: "More for matrix" }));
    await user.click(await screen.findByRole("menuitem", { name: "Remove" }));
    expect(await screen.findByText(/was removed\./)).toBeInTheDocument();
    expect(names()).toEqual(["survey", "base"]);
    await user.click(screen.getByRole("button", { name: "Undo the removal of matrix" }));
    await waitFor(() => expect(names()).toEqual(["survey", "matrix", "base"]));
  });
});

describe("the keys of a study", () => {
  it("go from band to band with J and K, swap form and text with T, and can be turned off", async () => {
    const { user } = await open();
    await user.keyboard("jj");
    expect(await band("base")).toHaveFocus();
    await user.keyboard("k");
    expect(await band("survey")).toHaveFocus();
    expect(within(await band("survey")).getByRole("button", { name: "Form" })).toHaveAttribute("aria-pressed", "true");
    await user.keyboard("t");
    expect(within(await band("survey")).getByRole("button", { name: "Text" })).toHaveAttribute("aria-pressed", "true");
    chooseLetterKeys(false);
    await user.keyboard("j");
    expect(await band("survey")).toHaveFocus();
  });

  it("leave a field's letters alone, and Escape leaves the field for its band", async () => {
    const { user } = await open();
    const title = screen.getByRole("textbox", { name: "Title of the study" });
    await user.click(title);
    await user.keyboard("j");
    expect(title).toHaveFocus();
    expect(title).toHaveValue("Food demand in Velmarkj");
    const keep = await within(await band("survey")).findByRole("textbox", { name: "Keep" });
    await user.click(keep);
    await user.keyboard("{Escape}");
    expect(await band("survey")).toHaveFocus();
  });
});

describe("a reader", () => {
  it("sees every finding and no way to change anything", async () => {
    await open("reader");
    expect(await within(await band("base")).findByText(/is a luxury/i)).toBeInTheDocument();
    expect(screen.getByRole("heading", { level: 1, name: study.title })).toBeVisible();
    for (const name of [/^Estimate/, /^Bring up to date/, "data", "system", "Seal a referee copy"]) {
      expect(screen.queryByRole("button", { name })).not.toBeInTheDocument();
    }
    expect(screen.queryByRole("textbox", { name: "Title of the study" })).not.toBeInTheDocument();
    expect(within(await band("survey")).queryByRole("combobox")).not.toBeInTheDocument();
  });

  it("has the ways of looking at a cell in its list of words, and none of changing it, by no key either", async () => {
    const { user, connection } = await open("reader");
    const base = await band("base");
    await user.click(within(base).getByRole("button", { name: "More for base" }));
    expect((await screen.findAllByRole("menuitem")).map(({ textContent }) => textContent)).toEqual(["Fold to a line"]);
    await user.keyboard("{Escape}");
    base.focus();
    const before = connection.snapshot().cells;
    await user.keyboard("d{Delete}{Alt>}{ArrowUp}{/Alt}{F2}");
    expect(connection.snapshot().cells).toBe(before);
    expect(screen.queryByRole("textbox", { name: "Name of base" })).not.toBeInTheDocument();
  });
});

describe("what is done with cells from the keyboard", () => {
  it("moves the cell in focus, says where it stands, and keeps it in focus", async () => {
    const { user } = await open();
    (await band("matrix")).focus();
    await user.keyboard("{Alt>}{ArrowUp}{/Alt}");
    await waitFor(() => expect(names()).toEqual(["survey", "matrix", "base"]));
    expect(screen.getByText("matrix is now cell 2 of 3.")).toHaveAttribute("role", "status");
    await waitFor(async () => expect(await band("matrix")).toHaveFocus());
    await user.keyboard("{Alt>}{ArrowUp}{ArrowUp}{/Alt}");
    await waitFor(() => expect(names()).toEqual(["matrix", "survey", "base"]));
  });

  it("adds a copy below, under a name of its own, which asks the same and is answered alike", async () => {
    const { user, connection } = await open();
    (await band("base")).focus();
    await user.keyboard("d");
    const copy = await band("base 2");
    expect(names()).toEqual(["survey", "base", "base", "matrix"]);
    expect(connection.snapshot().cells[2].source).toBe(connection.snapshot().cells[1].source);
    await waitFor(() => expect(copy).toHaveFocus());
    await user.click(within(copy).getByRole("button", { name: "More for base 2" }));
    expect(await screen.findByRole("menuitem", { name: "Compare with base" })).toBeInTheDocument();
  });

  it("removes the cell in focus, leads to the way back, and from there back to the cell", async () => {
    const { user } = await open();
    (await band("base")).focus();
    await user.keyboard("{Delete}");
    const undo = await screen.findByRole("button", { name: "Undo the removal of base" });
    await waitFor(() => expect(undo).toHaveFocus());
    await user.keyboard("{Enter}");
    await waitFor(async () => expect(await band("base")).toHaveFocus());
    expect(names()).toEqual(["survey", "base", "matrix"]);
  });

  it("puts a cell elsewhere by dragging its name, and only by that", async () => {
    await open();
    const dataTransfer = { setData: () => {}, effectAllowed: "" };
    const [matrix, survey] = [await band("matrix"), await band("survey")];
    // Nothing is laid out here: every band is at nought, so that below it is after it.
    const drop = (on: HTMLElement) => {
      fireEvent.dragOver(on, { dataTransfer, clientY: 1 });
      fireEvent.drop(on, { dataTransfer, clientY: 1 });
    };
    fireEvent.dragStart(within(matrix).getByRole("heading"), { dataTransfer });
    drop(survey);
    await waitFor(() => expect(names()).toEqual(["survey", "matrix", "base"]));
    fireEvent.dragStart(await band("base"), { dataTransfer });
    drop(survey);
    expect(names()).toEqual(["survey", "matrix", "base"]);
  });

  it("folds a cell to a line, which this browser remembers, and unfolds it", async () => {
    const { user } = await open();
    const base = await band("base");
    await within(base).findByText(/is a luxury/i);
    base.focus();
    await user.keyboard("c");
    expect(within(base).queryByText(/is a luxury/i)).not.toBeInTheDocument();
    expect(base).toHaveTextContent("Current");
    expect(localStorage.getItem("tangency-folded/s")).toBe('["b"]');
    await user.click(within(base).getByRole("button", { name: "Unfold base" }));
    expect(await within(base).findByText(/is a luxury/i)).toBeInTheDocument();
    expect(localStorage.getItem("tangency-folded/s")).toBeNull();
  });
});
