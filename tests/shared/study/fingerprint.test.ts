import { createHash } from "node:crypto";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { CellKind } from "../../../shared/schemas/cell.ts";
import { canonicalJson } from "../../../shared/study/canonical-json.ts";
import { fingerprintCell, sha256Hex } from "../../../shared/study/fingerprint.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";

describe("canonicalJson", () => {
  it("reads back as the same value whatever the order of keys", () => {
    fc.assert(
      fc.property(fc.jsonValue({ noUnicodeString: false }), (value) => {
        const text = canonicalJson(value);
        // JSON has one zero: −0 is written 0.
        expect(canonicalJson(JSON.parse(text))).toBe(text);
        expect(JSON.parse(text)).toEqual(JSON.parse(JSON.stringify(value)));
      }),
    );
  });

  it("sorts keys and writes numbers by their shortest text", () => {
    expect(canonicalJson({ b: [1e21, 0.1, -0, 1 / 3], a: undefined, A: "é\n" })).toBe(
      '{"A":"é\\n","b":[1e+21,0.1,0,0.3333333333333333]}',
    );
  });

  it.each([Number.NaN, Number.POSITIVE_INFINITY, [undefined], { a: () => 1 }, 1n])("refuses %s", (value) => {
    expect(() => canonicalJson(value)).toThrow(TypeError);
  });
});

describe("sha256Hex", () => {
  it("agrees with another implementation", () => {
    fc.assert(
      fc.property(fc.string({ unit: "grapheme" }), (text) => {
        expect(sha256Hex(text)).toBe(createHash("sha256").update(text, "utf8").digest("hex"));
      }),
    );
  });
});

describe("fingerprintCell", () => {
  const of = (kind: CellKind, source: string, over: Partial<Parameters<typeof fingerprintCell>[0]> = {}) => {
    const { specification } = parseCell(kind, source);
    if (!specification) throw new Error("the source is not sound");
    return fingerprintCell({ kind, specification, upstream: ["a".repeat(64)], engineVersion: "1", ...over });
  };
  const system = "data: survey\nform: la-aids\nimpose: [homogeneity]\n";

  it("does not change with comments, order of keys, defaults written out or the names of cells", () => {
    const same = "# why\nimpose: [homogeneity]\nform: la-aids\nindex: tornqvist\nalpha0: 0.0\ndata: 'other name'\n";
    expect(of("system", same)).toBe(of("system", system));
  });

  it("changes with anything the finding depends on", () => {
    const one = of("system", system);
    const others = [
      of("system", system.replace("la-aids", "aids")),
      of("system", `${system}demographics: [urban]`),
      of("system", system, { upstream: ["b".repeat(64)] }),
      of("system", system, { engineVersion: "2" }),
      of("system", system, { uploadSha: "c" }),
    ];
    expect(new Set([one, ...others]).size).toBe(6);
  });

  it("keeps the order of goods, which says which equation is which", () => {
    const a = "a: {price: p, quantity: q}";
    const b = "b: {price: r, quantity: s}";
    expect(of("data", `upload: u\ngoods: {${a}, ${b}}`)).not.toBe(of("data", `upload: u\ngoods: {${b}, ${a}}`));
    expect(of("data", `upload: u\ngoods: {${a}, ${b}}`)).toBe(
      of("data", `goods:\n  ${a}\n  b: {quantity: s, price: r}\nupload: u`),
    );
  });
});
