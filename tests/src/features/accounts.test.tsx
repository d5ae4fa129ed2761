import { screen } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import { AskAccountForm } from "../../../src/features/accounts/ask-account-form.tsx";
import { CreateAccountForm } from "../../../src/features/accounts/create-account-form.tsx";
import { FormatsChoice } from "../../../src/features/accounts/formats-choice.tsx";
import { budgetPath, indifferencePath, type Preferences } from "../../../src/features/accounts/indifference-curves.ts";
import { OwnData } from "../../../src/features/accounts/own-data.tsx";
import RemoveAccountDialog from "../../../src/features/accounts/remove-account-dialog.tsx";
import { SessionList } from "../../../src/features/accounts/session-list.tsx";
import { SignInForm } from "../../../src/features/accounts/sign-in-form.tsx";
import { ApiRefusal } from "../../../src/lib/api.ts";
import { answering, Refused, renderPart } from "../answering.tsx";

afterEach(() => vi.unstubAllGlobals());

const demo = [{ email: "ilse.marchetti@vihe.example", passphrase: "the levy on sweet drinks", role: "owner" }];
const installation = { name: "Velmark Institute", version: "1", demo };

describe("signing in", () => {
  it("sends address and passphrase, and goes on", async () => {
    const asked = answering({
      "GET /api/installation": { ...installation, demo: [] },
      "POST /api/auth/sign-in/email": {},
    });
    const onSignedIn = vi.fn();
    const { user } = renderPart(<SignInForm onSignedIn={onSignedIn} />);
    await user.type(await screen.findByLabelText("Email"), "ilse.marchetti@vihe.example");
    await user.type(screen.getByLabelText("Passphrase"), "a passphrase{Enter}");
    await vi.waitFor(() => expect(onSignedIn).toHaveBeenCalled());
    expect(asked.find(({ method }) => method === "POST")?.body).toEqual({
      email: "ilse.marchetti@vihe.example",
      password: "a passphrase",
    });
    expect(screen.queryByRole("region", { name: "The demo study" })).not.toBeInTheDocument();
  });

  it("does not say which of the two was wrong", async () => {
    answering({
      "GET /api/installation": installation,
      "POST /api/auth/sign-in/email": new Refused(401, "Unknown user."),
    });
    const onSignedIn = vi.fn();
    const { user } = renderPart(<SignInForm onSignedIn={onSignedIn} />);
    await user.type(await screen.findByLabelText("Email"), "ilse.marchetti@vihe.example");
    await user.type(screen.getByLabelText("Passphrase"), "not this one{Enter}");
    expect(await screen.findByRole("alert")).toHaveTextContent("No account has this address and this passphrase.");
    expect(onSignedIn).not.toHaveBeenCalled();
  });

  it("offers the people of the demo study, each one click", async () => {
    const asked = answering({ "GET /api/installation": installation, "POST /api/auth/sign-in/email": {} });
    const onSignedIn = vi.fn();
    const { user } = renderPart(<SignInForm onSignedIn={onSignedIn} />);
    await user.click(await screen.findByRole("button", { name: "ilse.marchetti@vihe.example" }));
    await vi.waitFor(() => expect(onSignedIn).toHaveBeenCalled());
    expect(asked.find(({ method }) => method === "POST")?.body).toEqual({
      email: demo[0].email,
      password: demo[0].passphrase,
    });
  });

  it("shows the passphrase when asked", async () => {
    answering({ "GET /api/installation": installation });
    const { user } = renderPart(<SignInForm onSignedIn={() => {}} />);
    const field = await screen.findByLabelText("Passphrase");
    expect(field).toHaveAttribute("type", "password");
    await user.click(screen.getByRole("button", { name: "Show the passphrase" }));
    expect(field).toHaveAttribute("type", "text");
  });
});

describe("creating an account", () => {
  const part = (onCreate = vi.fn(), error: unknown = null) => (
    <CreateAccountForm
      email="nora.lind@vihe.example"
      words="Create the account"
      isPending={false}
      error={error}
      onCreate={onCreate}
    />
  );

  it("begins with the address, and says the same whatever it belongs to", async () => {
    const asked = answering({
      "GET /api/installation": { ...installation, mail: "post box" },
      "POST /api/account-links": undefined,
    });
    const { user } = renderPart(<AskAccountForm />);
    await user.type(await screen.findByLabelText("Email"), "nora.lind{Enter}");
    expect(await screen.findByRole("alert")).toHaveTextContent("An e-mail address looks like name@place.example.");
    await user.type(screen.getByLabelText("Email"), "@vihe.example{Enter}");
    expect(await screen.findByRole("status")).toHaveTextContent("A message is on its way to nora.lind@vihe.example.");
    expect(await screen.findByText(/lie in a local post box/)).toBeInTheDocument();
    expect(asked.find(({ method }) => method === "POST")?.body).toEqual({ email: "nora.lind@vihe.example" });
  });

  it("names each field that will not do, and both numbers; the address is not to be changed", async () => {
    const onCreate = vi.fn();
    const { user } = renderPart(part(onCreate));
    await user.type(await screen.findByLabelText("Passphrase"), "too short");
    await user.click(screen.getByRole("button", { name: "Create the account" }));
    expect(await screen.findByText("The passphrase has 9 characters and needs at least 10.")).toBeInTheDocument();
    expect(screen.getByLabelText("Name")).toBeInvalid();
    expect(screen.getByLabelText("Email")).toHaveAttribute("readonly");
    expect(onCreate).not.toHaveBeenCalled();
  });

  it("tells what the installation refuses", async () => {
    renderPart(part(vi.fn(), new ApiRefusal(409, "conflict", "There is an account with this address already.")));
    expect(await screen.findByRole("alert")).toHaveTextContent("There is an account with this address already.");
  });
});

describe("sessions", () => {
  const now = new Date().toISOString();
  const session = (id: string, browser: string, isThis = false) => ({ id, browser, since: now, lastUsed: now, isThis });

  it("are ended one by one or all others at once, never the one in use", async () => {
    const asked = answering({ "DELETE /api/account/sessions/b": undefined, "DELETE /api/account/sessions": undefined });
    const sessions = [
      session("a", "Firefox on Linux", true),
      session("b", "Safari on a Mac"),
      session("c", "Edge on Windows"),
    ];
    const { user } = renderPart(<SessionList sessions={sessions} />);
    expect(await screen.findByText("this one")).toBeInTheDocument();
    expect(screen.queryByRole("button", { name: "End Firefox on Linux" })).not.toBeInTheDocument();
    await user.click(screen.getByRole("button", { name: "End Safari on a Mac" }));
    await user.click(await screen.findByRole("button", { name: "End all 2 others" }));
    await vi.waitFor(() =>
      expect(asked.map(({ path }) => path)).toEqual(["/api/account/sessions/b", "/api/account/sessions"]),
    );
  });
});

describe("deleting the account", () => {
  it("waits for studies to be handed over, and names them", async () => {
    const account = {
      id: "i",
      name: "Ilse",
      email: "ilse@vihe.example",
      isConfirmed: true,
      since: new Date().toISOString(),
      sessions: [],
      toHandOver: [{ studyId: "s", title: "Levy", others: 2 }],
      alone: [],
    };
    renderPart(<RemoveAccountDialog account={account} onClose={() => {}} onRemoved={() => {}} />);
    expect(await screen.findByRole("link", { name: "Levy" })).toHaveAttribute("href", "/studies/s");
    expect(screen.getByText("2 others in it")).toBeInTheDocument();
    expect(screen.queryByLabelText("Passphrase")).not.toBeInTheDocument();
  });
});

describe("the drawing at the door", () => {
  const plane = { width: 800, height: 1000 };
  const preferences: Preferences = { share: 0.51, choice: { x: 398, y: 390 } };
  const points = (path: string) =>
    path
      .slice(1)
      .split("L")
      .map((pair) => pair.split(" ").map(Number));

  it("touches the budget line at the chosen bundle and nowhere crosses it", () => {
    const [[left, top], [right, bottom]] = points(budgetPath(preferences, plane));
    const lineAt = (x: number) => top + ((bottom - top) * (x - left)) / (right - left);
    expect(lineAt(398)).toBeCloseTo(610, 0);
    const below = points(indifferencePath(preferences, plane, 1)).filter(([x, y]) => y > lineAt(x) + 0.5);
    expect(below).toEqual([]);
    const [nearest] = points(indifferencePath(preferences, plane, 1))
      .map(([x, y]) => ({ x, gap: lineAt(x) - y }))
      .toSorted((a, b) => a.gap - b.gap);
    expect(Math.abs(nearest.x - 398)).toBeLessThan(30);
  });
});

describe("what is kept of a person", () => {
  it("is handed to the browser as a file; where it cannot be had, why is said", async () => {
    vi.stubGlobal("URL", Object.assign(URL, { createObjectURL: () => "blob:kept", revokeObjectURL: () => {} }));
    const saved: string[] = [];
    vi.spyOn(HTMLAnchorElement.prototype, "click").mockImplementation(function (this: HTMLAnchorElement) {
      saved.push(this.download);
    });
    let answer: Response = new Response(null, { status: 503 });
    vi.stubGlobal("fetch", async () => answer);
    const { user } = renderPart(<OwnData />);
    await user.click(screen.getByRole("button", { name: "Save all of it as a file" }));
    expect(await screen.findByRole("alert")).toBeInTheDocument();
    expect(saved).toEqual([]);
    const headers = { "content-disposition": "attachment; filename=what-is-kept.json" };
    answer = new Response("{}", { headers });
    await user.click(screen.getByRole("button", { name: "Save all of it as a file" }));
    expect(await screen.findByText("Handed to the browser as what-is-kept.json.")).toBeInTheDocument();
    expect(saved).toEqual(["what-is-kept.json"]);
    expect(screen.queryByRole("alert")).not.toBeInTheDocument();
  });
});

describe("how dates and numbers are written", () => {
  it("is chosen by the place whose custom it is, and shown at once", async () => {
    const { user } = renderPart(<FormatsChoice />);
    const choice = screen.getByLabelText("Written");
    expect(choice).toHaveAccessibleDescription(/^9 March 2031, 14:08; 104,938 rows, 1\.6 s$/);
    await user.selectOptions(choice, "as in the United States");
    expect(choice).toHaveAccessibleDescription(/^March 9, 2031, 2:08 PM; 104,938 rows, 1\.6 s$/);
    await user.selectOptions(choice, "as in Germany");
    expect(choice).toHaveAccessibleDescription(/^9 March 2031, 14:08; 104.938 rows, 1,6 s$/);
    await user.selectOptions(choice, "as the browser says (en-GB)");
    expect(localStorage.getItem("tangency-formats")).toBeNull();
  });
});
