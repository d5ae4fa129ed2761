import { QueryClient } from "@tanstack/react-query";
import { afterEach, describe, expect, it, vi } from "vitest";
import { destinationOf, someoneSignedIn } from "../../../src/app/doorkeeper.ts";
import { answering, Refused } from "../answering.tsx";

afterEach(() => vi.unstubAllGlobals());

const goTo = (path: string) => {
  const load = someoneSignedIn(new QueryClient({ defaultOptions: { queries: { retry: false } } }));
  return load({ request: new Request(`http://here.example${path}`), params: {} } as Parameters<typeof load>[0]);
};

describe("the way in", () => {
  it("lets someone signed in through", async () => {
    const me = { id: "i", name: "Ilse Marchetti", email: "ilse.marchetti@vihe.example" };
    answering({ "GET /api/me": me });
    await expect(goTo("/")).resolves.toEqual(me);
  });

  it("shows everyone else the door, and remembers where they were going", async () => {
    answering({ "GET /api/me": new Refused(401, "Sign in to see this.") });
    const address = async (path: string) =>
      ((await goTo(path).catch((redirect: unknown) => redirect)) as Response).headers.get("location");
    expect(await address("/")).toBe("/sign-in");
    expect(await address("/studies/s")).toBe("/sign-in?to=%2Fstudies%2Fs");
  });

  it("tells a failure as a failure", async () => {
    answering({ "GET /api/me": new Refused(500, "Something failed here.") });
    await expect(goTo("/")).rejects.toThrow("Something failed here.");
  });

  it("goes on to pages of this installation only", () => {
    expect(destinationOf("?to=%2Fstudies%2Fs")).toBe("/studies/s");
    for (const to of ["", "?to=https://elsewhere.example", "?to=//elsewhere.example", "?to=/\\elsewhere.example"]) {
      expect(destinationOf(to)).toBe("/");
    }
  });
});
