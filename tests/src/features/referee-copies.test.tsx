import { screen } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import RefereeCopiesDialog from "../../../src/features/referee-copies/referee-copies-dialog.tsx";
import type { Sealable } from "../../../src/features/referee-copies/sealable.ts";
import { answering, Refused, renderPart } from "../answering.tsx";

afterEach(() => vi.unstubAllGlobals());

const copy = {
  id: "c",
  cellName: "matrix",
  note: "For the second round.",
  fingerprint: `7c1e4f0ab9d26358${"0".repeat(48)}`,
  sealedAt: "2031-03-09T10:00:00.000Z",
  sealedBy: "Ilse Marchetti",
  also: [],
};
const cells = [
  { cellId: "m", name: "matrix", kind: "slutsky" },
  { cellId: "n", name: "ninetieth", kind: "slutsky" },
  { cellId: "l", name: "laws", kind: "tests" },
  { cellId: "t", name: "argument", kind: "text" },
] as const;
const list = "GET /api/studies/s/referee-copies";
const seal = "POST /api/studies/s/referee-copies";

const open = (answers: Record<string, unknown>, choices: readonly Sealable[] = cells) => {
  const asked = answering(answers);
  return { ...renderPart(<RefereeCopiesDialog studyId="s" cells={choices} onClose={() => {}} />), asked };
};

describe("sealing a referee copy", () => {
  it("withholds the authors unless told otherwise, tells the link once and copies it", async () => {
    const { user, asked } = open({ [list]: [], [seal]: { copy, token: "an-unguessable-token" } });
    await user.click(await screen.findByRole("radio", { name: "ninetieth" }));
    await user.type(screen.getByLabelText("A note to the referee"), " For the second round. ");
    expect(screen.getByRole("checkbox", { name: "Withhold the authors' names" })).toBeChecked();
    await user.click(screen.getByRole("button", { name: "Seal a referee copy" }));
    const link = await screen.findByRole("textbox", { name: "Link to the referee copy" });
    expect(link).toHaveValue(`${location.origin}/referee/an-unguessable-token`);
    expect(asked.find(({ method }) => method === "POST")?.body).toEqual({
      cellId: "n",
      also: [],
      methods: false,
      note: "For the second round.",
      withholdAuthors: true,
    });
    await user.click(screen.getByRole("button", { name: "Copy the link" }));
    expect(await navigator.clipboard.readText()).toBe(`${location.origin}/referee/an-unguessable-token`);
    await user.click(screen.getByRole("button", { name: "Seal another" }));
    expect(screen.queryByDisplayValue(/an-unguessable-token/)).not.toBeInTheDocument();
  });

  it("seals further findings, with an end, in another's place, and sends the link", async () => {
    const { user, asked } = open({ [list]: [copy], [seal]: { copy, token: "an-unguessable-token" } });
    await user.click(await screen.findByRole("checkbox", { name: "laws tests" }));
    await user.click(screen.getByRole("checkbox", { name: "argument text" }));
    expect(screen.getByText(/look for names in them/)).toBeInTheDocument();
    await user.click(screen.getByRole("checkbox", { name: /^With the methods of its systems/ }));
    await user.click(screen.getByRole("checkbox", { name: "ninetieth slutsky" }));
    // Chosen as the matrix, it is no longer one of the others.
    await user.click(screen.getByRole("radio", { name: "ninetieth" }));
    await user.selectOptions(screen.getByLabelText("The link opens"), "for 90 days");
    await user.selectOptions(await screen.findByLabelText("In the place of"), "c");
    await user.type(screen.getByLabelText("Send the link to"), "not an address");
    await user.click(screen.getByRole("button", { name: "Seal a referee copy" }));
    expect(await screen.findByRole("alert")).toHaveTextContent("Write an e-mail address, or nothing.");
    await user.clear(screen.getByLabelText("Send the link to"));
    await user.type(screen.getByLabelText("Send the link to"), "editor@example.org");
    await user.click(screen.getByRole("button", { name: "Seal a referee copy" }));
    expect(await screen.findByText(/It is on its way to editor@example.org/)).toBeInTheDocument();
    const body = asked.find(({ method }) => method === "POST")?.body as Record<string, unknown>;
    expect(body).toMatchObject({
      cellId: "n",
      also: ["l", "t"],
      methods: true,
      replaces: "c",
      email: "editor@example.org",
    });
    const days = (Date.parse(String(body.expiresAt)) - Date.now()) / 86_400_000;
    expect(days).toBeCloseTo(90, 2);
  });

  it("tells why a matrix cannot be sealed", async () => {
    const sentence =
      "matrix stands at row 12, the prices and total of one household: seal it at the base point or the mean.";
    const { user } = open({ [list]: [], [seal]: new Refused(409, sentence) });
    await user.click(await screen.findByRole("button", { name: "Seal a referee copy" }));
    expect(await screen.findByRole("alert")).toHaveTextContent(sentence);
  });

  it("waits for a matrix that is current", async () => {
    open({ [list]: [] }, []);
    expect(await screen.findByText(/There is no matrix to seal yet/)).toBeInTheDocument();
    expect(screen.queryByRole("button", { name: "Seal a referee copy" })).not.toBeInTheDocument();
  });
});

describe("copies sealed so far", () => {
  it("say when they were opened, and are revoked once", async () => {
    const revoked = { ...copy, id: "d", cellName: "ninetieth", revokedAt: "2031-03-10T10:00:00.000Z" };
    const { user, asked } = open({
      [list]: [copy, revoked],
      "DELETE /api/studies/s/referee-copies/c": { ...copy, revokedAt: "2031-03-12T10:00:00.000Z" },
    });
    const entry = (await screen.findByText("7c1e 4f0a b9d2 6358", { selector: "li:first-child p" })).closest("li")!;
    expect(entry).toHaveTextContent("by Ilse Marchetti; not opened yet");
    expect(screen.queryByRole("button", { name: "Revoke the copy of ninetieth" })).not.toBeInTheDocument();
    await user.click(screen.getByRole("button", { name: "Revoke the copy of matrix" }));
    await vi.waitFor(() => expect(asked.some(({ method }) => method === "DELETE")).toBe(true));
  });

  it("say what is in them, what stands in their place and until when they open", async () => {
    const older = {
      ...copy,
      id: "o",
      also: ["laws", "fifths"],
      replacedBy: "c",
      lastOpenedAt: "2024-03-09T11:00:00.000Z",
    };
    const past = { ...copy, id: "p", cellName: "ninetieth", expiresAt: "2024-03-20T10:00:00.000Z" };
    open({ [list]: [{ ...copy, sealedAt: "2024-03-12T10:00:00.000Z" }, older, past] });
    const [, replaced, runOut] = (await screen.findAllByText(/sealed .* by Ilse Marchetti/)).map(
      (line) => line.textContent,
    );
    expect(replaced).toMatch(/^matrix with laws and fifths, .*last opened .*; replaced by that of 12 March 2024$/);
    expect(runOut).toMatch(/not opened yet; run out 20 March 2024$/);
  });

  it("have their end moved, and a new link", async () => {
    const { user, asked } = open({
      [list]: [copy],
      "PATCH /api/studies/s/referee-copies/c": copy,
      "POST /api/studies/s/referee-copies/c/link": { copy, token: "another-token" },
    });
    await user.click(await screen.findByRole("button", { name: "Move the end of the copy of matrix" }));
    await user.click(screen.getByRole("button", { name: "until it is revoked" }));
    await vi.waitFor(() => expect(asked.find(({ method }) => method === "PATCH")?.body).toEqual({ expiresAt: null }));
    await user.click(screen.getByRole("button", { name: "New link of the copy of matrix" }));
    await user.click(screen.getByRole("button", { name: "Make a new link" }));
    expect(await screen.findByDisplayValue(/referee\/another-token$/)).toBeInTheDocument();
  });
});
