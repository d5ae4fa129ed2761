import { screen, within } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import PeopleDialog from "../../../src/features/people/people-dialog.tsx";
import { answering, Refused, renderPart } from "../answering.tsx";

afterEach(() => vi.unstubAllGlobals());

const ilse = { id: "i", name: "Ilse Marchetti", email: "ilse.marchetti@vihe.example", role: "owner" };
const tomas = { id: "t", name: "Tomás Adeyemi", email: "tomas.adeyemi@vihe.example", role: "coauthor" };

const now = new Date().toISOString();
const soon = new Date(Date.now() + 14 * 24 * 3_600_000).toISOString();

function open(isOwner: boolean, answers: Record<string, unknown> = {}) {
  const asked = answering({
    "GET /api/studies/s/people": [ilse, tomas],
    "GET /api/studies/s/invitations": [],
    ...answers,
  });
  const onLeft = vi.fn();
  const you = isOwner ? "i" : "t";
  const part = <PeopleDialog studyId="s" you={you} isOwner={isOwner} onClose={() => {}} onLeft={onLeft} />;
  return { ...renderPart(part), asked, onLeft };
}

describe("the people of a study", () => {
  it("are invited by their address, as what the owner says; those who have not answered are listed", async () => {
    const petra = {
      id: "v",
      email: "petra.vance@vihe.example",
      role: "reader",
      invitedAt: now,
      expiresAt: soon,
      hasRunOut: false,
    };
    const { user, asked } = open(true, {
      "GET /api/studies/s/invitations": [{ ...petra, id: "w", email: "nora.lind@vihe.example", hasRunOut: true }],
      "POST /api/studies/s/invitations": petra,
      "DELETE /api/studies/s/invitations/w": undefined,
    });
    expect(await screen.findByText(/The link has run out\./)).toBeInTheDocument();
    await user.click(screen.getByRole("button", { name: "Withdraw the invitation of nora.lind@vihe.example" }));
    await user.type(screen.getByLabelText("Email"), petra.email);
    await user.selectOptions(screen.getByLabelText("As"), "reader");
    await user.click(screen.getByRole("button", { name: "Invite" }));
    expect(await screen.findByText("A message is on its way to petra.vance@vihe.example.")).toBeInTheDocument();
    expect(asked.find(({ method }) => method === "POST")?.body).toEqual({ email: petra.email, role: "reader" });
    expect(asked.some(({ method }) => method === "DELETE")).toBe(true);
  });

  it("are told why an invitation is refused", async () => {
    const sentence = "Tomás Adeyemi is the study's coauthor already.";
    const { user } = open(true, { "POST /api/studies/s/invitations": new Refused(409, sentence) });
    await user.type(await screen.findByLabelText("Email"), `${tomas.email}{Enter}`);
    expect(await screen.findByRole("alert")).toHaveTextContent(sentence);
  });

  it("are handed the study after a second question", async () => {
    const { user, asked } = open(true, { "POST /api/studies/s/owner": [ilse, tomas] });
    await user.click(await screen.findByRole("button", { name: "Hand over" }));
    expect(asked.some(({ method }) => method === "POST")).toBe(false);
    await user.click(screen.getByRole("button", { name: "Hand over to Tomás Adeyemi" }));
    await vi.waitFor(() => expect(asked.find(({ method }) => method === "POST")?.body).toEqual({ userId: "t" }));
  });

  it("get another role, and are removed", async () => {
    const { user, asked } = open(true, {
      "PATCH /api/studies/s/people/t": { ...tomas, role: "reader" },
      "DELETE /api/studies/s/people/t": undefined,
    });
    await user.selectOptions(await screen.findByRole("combobox", { name: "Role of Tomás Adeyemi" }), "reader");
    await user.click(screen.getByRole("button", { name: "Remove Tomás Adeyemi" }));
    await vi.waitFor(() => expect(asked.filter(({ method }) => method !== "GET")).toHaveLength(2));
    expect(asked.find(({ method }) => method === "PATCH")?.body).toEqual({ role: "reader" });
  });

  it("who do not own it see who is there, and may leave", async () => {
    const { user, onLeft } = open(false, { "DELETE /api/studies/s/people/t": undefined });
    const list = await screen.findAllByRole("listitem");
    expect(within(list[0]).queryByRole("button")).not.toBeInTheDocument();
    expect(screen.queryByRole("combobox")).not.toBeInTheDocument();
    expect(screen.queryByRole("heading", { name: "Invite someone" })).not.toBeInTheDocument();
    await user.click(within(list[1]).getByRole("button", { name: "Leave the study" }));
    await vi.waitFor(() => expect(onLeft).toHaveBeenCalled());
  });
});
