import { describe, expect, it } from "vitest";
import { describeChanges } from "../../../shared/study/changes.ts";
import { fingerprintCells } from "../../../shared/study/fingerprints.ts";
import { resolveCells } from "../../../shared/study/resolve.ts";
import { cellStatuses, type StateParts } from "../../../shared/study/states.ts";

const uploads = [
  {
    name: "u.csv",
    sha256: "0".repeat(64),
    columns: ["p_a", "q_a", "p_b", "q_b", "urban"].map((name) => ({ name, type: "number" as const })),
  },
];
const SURVEY = "upload: u.csv\ngoods: {a: {price: p_a, quantity: q_a}, b: {price: p_b, quantity: q_b}}\n";
const study = (base = "data: survey\nform: la-aids\n", survey = SURVEY) =>
  resolveCells(
    [
      { id: "1", name: "matrix", kind: "slutsky", order: "a", source: "system: base\n" },
      { id: "2", name: "base", kind: "system", order: "b", source: base },
      { id: "3", name: "survey", kind: "data", order: "c", source: survey },
    ],
    uploads,
  );

function states(cells: ReturnType<typeof study>, over: Partial<StateParts> = {}) {
  const none = new Map<string, never>();
  const parts = {
    cells,
    fingerprints: fingerprintCells(cells, uploads),
    found: new Set<string>(),
    running: none,
    failed: none,
    stopped: none,
    last: none,
    aboutMs: none,
  };
  return cellStatuses({ ...parts, ...over }).map(({ name, state, because }) => [name, state, because]);
}
const last = (source: string) =>
  new Map([["2", { fingerprint: "f".repeat(64), source, at: "2030-01-01T12:00:00Z", tookMs: 5 }]]);

describe("cellStatuses", () => {
  it("keeps the study's order, whatever reads what", () => {
    expect(states(study())).toEqual([
      ["matrix", "draft", "waits for base to be estimated"],
      ["base", "draft", "waits for survey"],
      ["survey", "draft", undefined],
    ]);
  });

  it("is current where the question is answered", () => {
    const cells = study();
    const fingerprints = fingerprintCells(cells, uploads);
    expect(states(cells, { found: new Set(fingerprints.values()) }).map(([, state]) => state)).toEqual([
      "current",
      "current",
      "current",
    ]);
  });

  it("says which key changed, and keeps the last finding", () => {
    const cells = study("data: survey\nform: aids\n");
    const parts = { last: last("data: survey\nform: la-aids\n") };
    expect(states(cells, parts)[1]).toEqual(["base", "out of date", "form changed from la-aids to aids"]);
  });

  it("says what above it changed when its own source did not", () => {
    const cells = study();
    expect(states(cells, { last: last("form: la-aids\ndata: survey # same\n") })[1]).toEqual([
      "base",
      "out of date",
      "survey changed",
    ]);
  });

  it("fails at a key, before estimation, and what reads it waits", () => {
    expect(states(study("data: survey\nform: la-aids\ndemographics: [urbn]\n"))).toEqual([
      ["matrix", "draft", "waits for base, which failed at demographics, before estimation"],
      ["base", "failed", "at demographics, before estimation"],
      ["survey", "draft", undefined],
    ]);
  });

  it("tells what was stopped, and what the engine refused, of that question only", () => {
    const cells = study();
    const fingerprint = fingerprintCells(cells, uploads).get("2") ?? "";
    expect(states(cells, { stopped: new Map([[fingerprint, "cancelled"]]) })[1]).toEqual([
      "base",
      "draft",
      "cancelled",
    ]);
    const failed = new Map([[fingerprint, [{ sentence: "No.", key: ["form"] }]]]);
    expect(states(cells, { failed })[1]).toEqual(["base", "failed", "at form"]);
    expect(states(study("data: survey\nform: les\n"), { failed })[1]).toEqual(["base", "draft", "waits for survey"]);
  });

  it("has an answer for cells that read one another in a circle", () => {
    const circle = resolveCells(
      [
        { id: "1", name: "a", kind: "system", order: "a", source: "like: b\nform: aids\n" },
        { id: "2", name: "b", kind: "system", order: "b", source: "like: a\ndata: survey\n" },
      ],
      uploads,
    );
    expect(states(circle).map(([, state]) => state)).toEqual(["failed", "failed"]);
  });
});

describe("describeChanges", () => {
  it.each([
    ["form: aids", "form: les", "form changed from aids to les"],
    ["form: aids", "form: aids # the same", undefined],
    ["a: 1\nb: 2", "b: 2\na: 1", undefined],
    [
      "impose: [homogeneity]",
      "impose: [homogeneity, symmetry]",
      "impose changed from homogeneity to homogeneity and symmetry",
    ],
    ["impose: [homogeneity]", "impose: []", "impose changed from homogeneity to none"],
    ["form: aids", "form: aids\nalpha0: 2", "alpha0 added"],
    ["form: aids\nindex: stone", "form: aids", "index removed"],
    ["goods: {a: {price: p}}", "goods: {a: {price: r}}", "goods changed"],
    [
      "a: 1\nb: 1\nc: 1\nd: 1",
      "a: 2\nb: 2\nc: 2\nd: 2",
      "a changed from 1 to 2, b changed from 1 to 2 and 2 more keys changed",
    ],
    ["form: aids", "form: [", "its source changed"],
    ["alpha0: .nan", "alpha0: .inf", "alpha0 changed from NaN to Infinity"],
  ])("%j to %j", (before, now, change) => {
    expect(describeChanges(before, now)).toBe(change);
  });
});
