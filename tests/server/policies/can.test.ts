import { describe, expect, test } from "vitest";
import { ACTIONS, type Action, can } from "../../../server/policies/can.ts";
import type { Role } from "../../../shared/schemas/resources.ts";

const MAY: Record<Role, readonly Action[]> = {
  // Words are changed by whoever wrote them, and by no role.
  owner: ACTIONS.filter((action) => action !== "remark.edit"),
  coauthor: [
    "study.read",
    "study.change",
    "document.read",
    "document.write",
    "history.read",
    "checkpoint.read",
    "checkpoint.make",
    "checkpoint.change",
    "checkpoint.return",
    "study.put away",
    "people.read",
    "journal.read",
    "upload.read",
    "upload.add",
    "upload.remove",
    "finding.read",
    "estimation.start",
    "estimation.cancel",
    "remark.read",
    "remark.write",
    "remark.settle",
  ],
  reader: [
    "study.read",
    "document.read",
    "history.read",
    "checkpoint.read",
    "study.put away",
    "people.read",
    "journal.read",
    "upload.read",
    "finding.read",
    "remark.read",
    "remark.write",
  ],
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

test("what one wrote oneself counts for remarks, in the study only and for nothing else", () => {
  const study = { roleOf: (id: string) => (id === "petra" ? ("reader" as const) : undefined) };
  for (const action of ["remark.edit", "remark.settle", "remark.withdraw"] as const) {
    expect(can({ id: "petra" }, action, study, "petra")).toBe(true);
    expect(can({ id: "petra" }, action, study, "ilse")).toBe(false);
    expect(can({ id: "gone" }, action, study, "gone")).toBe(false);
  }
  expect(can({ id: "petra" }, "document.write", study, "petra")).toBe(false);
  expect(can({ id: "petra" }, "study.delete", study, "petra")).toBe(false);
});

test("an owner edits nobody else's remark", () => {
  expect(can({ id: "ilse" }, "remark.edit", { roleOf: () => "owner" }, "petra")).toBe(false);
});
