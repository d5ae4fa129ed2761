import { describe, expect, test } from "vitest";
import { ACTIONS, type Action, can } from "../../../server/policies/can.ts";
import type { Role } from "../../../shared/schemas/resources.ts";

const MAY: Record<Role, readonly Action[]> = {
  owner: ACTIONS,
  coauthor: [
    "study.read",
    "study.change",
    "document.read",
    "document.write",
    "people.read",
    "upload.read",
    "upload.add",
    "upload.remove",
    "finding.read",
    "estimation.start",
    "estimation.cancel",
  ],
  reader: ["study.read", "document.read", "people.read", "upload.read", "finding.read"],
};

describe.each(ACTIONS)("%s", (action) => {
  test.each(Object.entries(MAY))("as %s", (role, actions) => {
    expect(can({ id: "a" }, action, { roleOf: () => role as Role })).toBe(actions.includes(action));
  });

  test("by no member, and by nobody", () => {
    expect(can({ id: "b" }, action, { roleOf: (id) => (id === "a" ? "owner" : undefined) })).toBe(false);
    expect(can(undefined, action, { roleOf: () => "owner" })).toBe(false);
  });
});
