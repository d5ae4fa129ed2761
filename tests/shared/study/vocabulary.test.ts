import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { CELL_KINDS, SPECIFICATIONS } from "../../../shared/schemas/cell.ts";
import { PROGRAM_VERSION } from "../../../shared/study/program.ts";
import { keyWord, REFERENCES, VOCABULARY } from "../../../shared/study/vocabulary.ts";
import { SYSTEM_NAMES } from "../../../shared/systems/names.ts";

describe("VOCABULARY", () => {
  it.each(CELL_KINDS)("has every key of a %s cell's schema, and no other but like", (kind) => {
    const keys = Object.keys(SPECIFICATIONS[kind].shape).filter((key) => key !== "kind");
    expect(VOCABULARY[kind].map(({ key }) => key).filter((key) => key !== "like")).toEqual(keys);
    for (const { says } of VOCABULARY[kind]) expect(says).toMatch(/^[a-z].*[^.]$/);
    for (const key of Object.keys(REFERENCES[kind])) expect(keys).toContain(key);
  });

  it("reads values, lists and inner keys off the schemas", () => {
    expect(keyWord("system", "form")).toMatchObject({ values: [...SYSTEM_NAMES], needed: true, list: false });
    expect(keyWord("system", "impose")).toMatchObject({
      values: ["homogeneity", "symmetry"],
      needed: false,
      list: true,
    });
    expect(keyWord("data", "goods")).toMatchObject({
      named: true,
      keys: [{ key: "price" }, { key: "quantity" }, { key: "expenditure" }],
    });
    expect(keyWord("slutsky", "at")?.values).toEqual(["base point", "mean"]);
    expect(keyWord("slutsky", "at")?.keys.map(({ key }) => key)).toEqual(["row", "x", "prices"]);
  });
});

describe("PROGRAM_VERSION", () => {
  it("is that of package.json", () => {
    const file = readFileSync(new URL("../../../package.json", import.meta.url), "utf8");
    expect(PROGRAM_VERSION).toBe((JSON.parse(file) as { version: string }).version);
  });
});
