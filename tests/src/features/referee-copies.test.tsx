import { screen } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import RefereeCopiesDialog from "../../../src/features/referee-copies/referee-copies-dialog.tsx";
import { answering, Refused, renderPart } from "../answering.tsx";

afterEach(() => vi.unstubAllGlobals());

const copy = {
  id: "c",
  cellName: "matrix",
  note: "For the second round.",
  fingerprint: `7c1e4f0ab9d26358${"0".repeat(48)}`,
  sealedAt: "2031-03-09T10:00:00.000Z",
  sealedBy: "Ilse Marchetti",
};
const matrices = [
  { cellId: "m", name: "matrix" },
  { cellId: "n", name: "ninetieth" },
];
const list = "GET /api/studies/s/referee-copies";
const seal = "POST /api/studies/s/referee-copies";

const open = (answers: Record<string, unknown>, choices = matrices) => {
  const asked = answering(answers);
  return { ...renderPart(<RefereeCopiesDialog studyId="s" matrices={choices} onClose={() => {}} />), asked };
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
      note: "For the second round.",
      withholdAuthors: true,
    });
    await user.click(screen.getByRole("button", { name: "Copy the link" }));
    expect(await navigator.clipboard.readText()).toBe(`${location.origin}/referee/an-unguessable-token`);
    await user.click(screen.getByRole("button", { name: "Seal another" }));
    expect(screen.queryByDisplayValue(/an-unguessable-token/)).not.toBeInTheDocument();
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
});
