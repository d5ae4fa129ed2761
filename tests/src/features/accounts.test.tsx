import { screen } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import { CreateAccountForm } from "../../../src/features/accounts/create-account-form.tsx";
import { budgetPath, indifferencePath, type Preferences } from "../../../src/features/accounts/indifference-curves.ts";
import { SignInForm } from "../../../src/features/accounts/sign-in-form.tsx";
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
  it("names each field that will not do, and both numbers", async () => {
    const asked = answering({});
    const { user } = renderPart(<CreateAccountForm onSignedIn={() => {}} />);
    await user.type(await screen.findByLabelText("Passphrase"), "too short");
    await user.click(screen.getByRole("button", { name: "Create the account" }));
    expect(await screen.findByText("The passphrase has 9 characters and needs at least 10.")).toBeInTheDocument();
    expect(screen.getByLabelText("Name")).toBeInvalid();
    expect(screen.getByLabelText("Email")).toBeInvalid();
    expect(asked).toEqual([]);
  });

  it("tells what the installation refuses", async () => {
    answering({ "POST /api/auth/sign-up/email": new Refused(422, "There is an account with this address already.") });
    const { user } = renderPart(<CreateAccountForm onSignedIn={() => {}} />);
    await user.type(await screen.findByLabelText("Name"), "Nora Lind");
    await user.type(screen.getByLabelText("Email"), "nora.lind@vihe.example");
    await user.type(screen.getByLabelText("Passphrase"), "quite a long one{Enter}");
    expect(await screen.findByRole("alert")).toHaveTextContent("There is an account with this address already.");
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
