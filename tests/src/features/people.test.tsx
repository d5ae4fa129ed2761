import { screen, within } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import PeopleDialog from "../../../src/features/people/people-dialog.tsx";
import { answering, Refused, renderPart } from "../answering.tsx";

afterEach(() => vi.unstubAllGlobals());

const ilse = { id: "i", name: "Ilse Marchetti", email: "ilse.marchetti@vihe.example", role: "owner" };
const tomas = { id: "t", name: "Tomás Adeyemi", email: "tomas.adeyemi@vihe.example", role: "coauthor" };

function open(isOwner: boolean, answers: Record<string, unknown> = {}) {
  const asked = answering({ "GET /api/studies/s/people": [ilse, tomas], ...answers });
  const onLeft = vi.fn();
  const you = isOwner ? "i" : "t";
  const part = <PeopleDialog studyId="s" you={you} isOwner={isOwner} onClose={() => {}} onLeft={onLeft} />;
  return { ...renderPart(part), asked, onLeft };
}

describe("the people of a study", () => {
  it("are added by their address, as what the owner says", async () => {
    const petra = { id: "p", name: "Petra Vance", email: "petra.vance@vihe.example", role: "reader" };
    const { user, asked } = open(true, { "POST /api/studies/s/people": petra });
    await user.type(await screen.findByLabelText("Email"), petra.email);
    await user.selectOptions(screen.getByLabelText("As"), "reader");
    await user.click(screen.getByRole("button", { name: "Add" }));
    expect(await screen.findByText("Petra Vance is in the study now, as reader.")).toBeInTheDocument();
    expect(asked.find(({ method }) => method === "POST")?.body).toEqual({ email: petra.email, role: "reader" });
  });

  it("are not added without an account, and the reason is told", async () => {
    const sentence = "There is no account with the address nobody@vihe.example: it is made on the sign-in page first.";
    const { user } = open(true, { "POST /api/studies/s/people": new Refused(404, sentence) });
    await user.type(await screen.findByLabelText("Email"), "nobody@vihe.example{Enter}");
    expect(await screen.findByRole("alert")).toHaveTextContent(sentence);
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
    expect(screen.queryByRole("heading", { name: "Add someone" })).not.toBeInTheDocument();
    await user.click(within(list[1]).getByRole("button", { name: "Leave the study" }));
    await vi.waitFor(() => expect(onLeft).toHaveBeenCalled());
  });
});
