import { describe, expect, it } from "vitest";
import { systemSentence } from "../../../shared/tables/sentence.ts";
import { exampleFindings } from "../../support/findings.ts";

const { system } = exampleFindings();

describe("weights so unequal that few rows decide", () => {
  const said = (effectiveRows?: number) =>
    systemSentence({ ...system, rows: 4812, ...(effectiveRows && { effectiveRows }) }).replaceAll("\u2009", ",");

  it("are said at the head below a tenth of the rows, with both numbers", () => {
    expect(said(310)).toContain("The weights make 4,812 rows tell as much as 310 of one weight.");
    expect(said(481)).toContain("tell as much as");
  });

  it("and not from a tenth on, nor where rows weigh the same", () => {
    expect(said(482)).not.toContain("tell as much as");
    expect(said()).not.toContain("tell as much as");
  });
});
