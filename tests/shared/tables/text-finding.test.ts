import { describe, expect, it } from "vitest";
import { textFinding as schema } from "../../../shared/schemas/text.ts";
import { askedNumbers } from "../../../shared/study/asked-numbers.ts";
import {
  asSealed,
  type QuotedCell,
  quotationsInWords,
  quotedNumbersTable,
  sealedText,
  textFinding,
} from "../../../shared/tables/text-finding.ts";
import { sampleData, sampleSystem } from "../../support/sample-findings.ts";

const system = sampleSystem();
const data = sampleData();
const SHA = "a".repeat(64);
const CELLS: Readonly<Record<string, QuotedCell>> = {
  base: { standing: "current", finding: system, fingerprint: SHA },
  linear: { standing: "out of date", finding: system, fingerprint: SHA, because: "form changed from la-aids to aids" },
  survey: { standing: "current", finding: data },
};
const KINDS: Readonly<Record<string, string>> = { base: "system", linear: "system", survey: "data" };

function found(text: string) {
  const cellOf = (name: string): QuotedCell =>
    CELLS[name] ?? { standing: "absent", because: `No cell is called ${name}.` };
  return schema.parse(
    textFinding(
      text,
      askedNumbers(text, (name) => KINDS[name]),
      cellOf,
    ),
  );
}

describe("a text with its numbers", () => {
  it("has them printed in their places", () => {
    const { resolved, quotations } = found("Meat is a luxury, *η* = {base: η, meat & fish, alone}.");
    expect(resolved).toBe("Meat is a luxury, *η* = 1.318.");
    expect(quotations).toEqual([
      {
        from: 24,
        to: 53,
        cell: "base",
        words: ["η", "meat & fish", "alone"],
        standing: "current",
        printed: "1.318",
        says: "expenditure elasticity of meat & fish at the base point",
        fingerprint: SHA,
      },
    ]);
  });

  it("never shows a number that is out of date, or none, as a current one", () => {
    const { resolved, quotations } = found("{linear: eta, meat & fish, alone}; {gone: rows}; {base: lambda, grains}");
    expect(resolved).toBe(
      "1.318 (out of date: form changed from la-aids to aids); (no number for gone: rows. No cell is called gone.); (no number for base: lambda, grains. The form aids has no λ.)",
    );
    expect(quotations.map(({ standing }) => standing)).toEqual(["out of date", "absent", "absent"]);
  });

  it("keeps signs with a meaning in Markdown from taking it", () => {
    expect(found("{a_b_c: *x*}").resolved).toBe("(no number for a\\_b\\_c: \\*x\\*. No cell is called a\\_b\\_c.)");
  });

  it.each([
    ["nothing", "quotes no number"],
    ["{base: rows}", "1 quoted number, from a current finding"],
    ["{base: rows} {survey: goods} {base: aic}", "3 quoted numbers, all from current findings"],
    ["{base: rows} {linear: rows} {survey: goods}", "1 of 3 quoted numbers is out of date"],
    [
      "{linear: rows} {linear: rows} {gone: goods}",
      "2 of 3 quoted numbers are out of date; 1 of 3 quoted numbers is not there",
    ],
    ["{linear: rows}", "the quoted number is out of date"],
  ])("counts them for the state line: %s", (text, words) =>
    expect(quotationsInWords(found(text).quotations)).toBe(words),
  );

  it("lists each with what it is and where it is from", () => {
    const { rows } = quotedNumbersTable(found("{base: rows} {linear: rows}"));
    expect(rows.map(({ label }) => label)).toEqual(["base: rows", "linear: rows"]);
    expect(rows[1].cells.map((cell) => (cell.kind === "text" ? cell.text : ""))).toEqual([
      "900",
      "rows of the equations",
      "out of date: form changed from la-aids to aids",
      "a".repeat(16),
    ]);
  });

  it("is sealed with fingerprints where every number is current, and not otherwise", () => {
    expect(sealedText(found("Of {base: rows} rows."))).toEqual({
      kind: "text",
      markdown: "Of 900 rows.",
      numbers: [
        {
          from: 3,
          to: 6,
          cell: "base",
          words: ["rows"],
          printed: "900",
          says: "rows of the equations",
          fingerprint: SHA,
        },
      ],
    });
    expect(sealedText(found("Of {linear: rows} rows."))).toEqual({
      refused: "the quoted number is out of date: 900 (out of date: form changed from la-aids to aids)",
    });
    expect(sealedText(found("{base: rows} rows, {base: eta, bread}."))).toEqual({
      refused: expect.stringMatching(/^1 of 2 quoted numbers is not there: base: eta, bread has no number \(.*bread/),
    });
  });

  it("is sealed with every number where it stands in the sealed words, and reads there as it did", () => {
    const before = found("*η* = {base: η, meat & fish} over {survey: rows used} rows; $x^2$ {base: rows}.");
    const sealed = sealedText(before);
    if ("refused" in sealed) throw new Error(sealed.refused);
    expect(sealed.numbers.map(({ from, to }) => sealed.markdown.slice(from, to))).toEqual(
      before.quotations.map(({ printed }) => printed),
    );
    expect(schema.parse(asSealed(sealed)).quotations.map(({ says }) => says)).toEqual(
      before.quotations.map(({ says }) => says),
    );
  });
});
