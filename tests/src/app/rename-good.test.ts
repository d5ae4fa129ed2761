import { describe, expect, it } from "vitest";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { sourcesAfterRenamingGood } from "../../../src/app/workspace/rename-good.ts";
import { studyCells } from "../study-sources.ts";

const cell = (name: string, kind: string, source: string): CellSource => ({ id: name, name, kind, order: "b", source });
const [survey] = studyCells();

/** What becomes of one cell beside survey, base and matrix when dairy is called milk & cheese. */
function renamed(name: string, kind: string, source: string, others: readonly CellSource[] = []): string | undefined {
  const cells = [...studyCells(), ...others, cell(name, kind, source)];
  return sourcesAfterRenamingGood(survey, "dairy", "milk & cheese", cells).get(name);
}

describe("a good that gets another name", () => {
  it("has it in its data cell, its mapping, place and comments as they were", () => {
    const own = { ...survey, source: survey.source.replace("e_dairy}", "e_dairy} # litres") };
    const changed = sourcesAfterRenamingGood(own, "dairy", "milk & cheese", [own, ...studyCells().slice(1)]);
    expect([...changed]).toEqual([["s", own.source.replace("  dairy:", "  milk & cheese:")]]);
  });

  it("is followed by the equation a system drops, whether its data is its own or taken over", () => {
    expect(renamed("rival", "system", "data: survey\nform: aids\ndropped: dairy # small\n")).toBe(
      "data: survey\nform: aids\ndropped: milk & cheese # small\n",
    );
    expect(renamed("rival", "system", "like: base\ndropped: dairy\n")).toBe("like: base\ndropped: milk & cheese\n");
    expect(renamed("rival", "system", "data: survey\nform: aids\ndropped: grains\n")).toBeUndefined();
  });

  it.each(["elasticities", "slutsky"])("is followed by the prices of one's own in a cell of %s", (kind) => {
    expect(renamed("own", kind, "system: base\nat: {prices: {grains: 1.2, dairy: 3}, x: 90} # March\n")).toBe(
      "system: base\nat: {prices: {grains: 1.2, milk & cheese: 3}, x: 90} # March\n",
    );
    expect(renamed("own", kind, "system: base\nat: mean\n")).toBeUndefined();
  });

  it("is followed by the group of which a system of its own has the goods", () => {
    const others = [
      cell(
        "cows",
        "data",
        "upload: cows.csv\ngoods: {dairy: {price: p, quantity: q}, beef: {price: r, quantity: s}}\n",
      ),
      cell("milk", "system", "data: cows\nform: aids\nconditional on: dairy\n"),
    ];
    const source = "system: milk\nwithin: base\nas: dairy # all of it\n";
    expect(renamed("stages", "elasticities", source, others)).toBe(source.replace("dairy", "milk & cheese"));
    // The good of that name in the group's own data is another one.
    const turned = "system: base\nwithin: milk\nas: dairy\n";
    expect(renamed("turned", "elasticities", turned, others)).toBeUndefined();
  });

  it("is followed by the prices that change, and by those they change from", () => {
    const source = "system: base\nat: {prices: {grains: 1, dairy: 2}, x: 9}\nprices:\n  dairy: {per cent: 10} # levy\n";
    expect(renamed("levy", "price change", source)).toBe(source.replaceAll("dairy", "milk & cheese"));
  });

  it("is followed by the goods a figure shows, of the system or of a price change on it", () => {
    const source = "system: base\nshow: engel curves\ngoods: [grains, dairy] # two of them\n";
    expect(renamed("curves", "figure", source)).toBe(source.replace("dairy", "milk & cheese"));
    expect(renamed("shares", "figure", "data: survey\nshow: shares by group\n")).toBeUndefined();
    const elsewhere = cell("other", "data", "upload: o.csv\ngoods: {dairy: {price: p, quantity: q}}\n");
    const theirs = "data: other\nshow: price distribution\ngoods: [dairy]\n";
    expect(renamed("theirs", "figure", theirs, [elsewhere])).toBeUndefined();
  });

  it("is followed by numbers quoted of cells on the data, where a good is asked for and nowhere else", () => {
    const text =
      "Dairy {base: eta, Dairy, alone}, {base: demographic, dairy, dairy}, {matrix: entry, dairy, grains}, {survey: mean share, dairy}, `{base: eta, dairy}`, dairy.";
    expect(renamed("argument", "text", text)).toBe(
      "Dairy {base: eta, milk & cheese, alone}, {base: demographic, dairy, milk & cheese}, {matrix: entry, milk & cheese, grains}, {survey: mean share, milk & cheese}, `{base: eta, dairy}`, dairy.",
    );
    const cells = [...studyCells(), cell("argument", "text", "{base: eta, dairy}")];
    expect(sourcesAfterRenamingGood(survey, "dairy", "milk, fresh", cells).get("argument")).toBe(
      '{base: eta, "milk, fresh"}',
    );
  });

  it("leaves alone what rests on other data, and a map that has the new name already", () => {
    const others = [
      cell("panel", "data", "upload: b.csv\ngoods: {dairy: {price: p, expenditure: e}}\n"),
      cell("of panel", "system", "data: panel\nform: aids\ndropped: dairy\n"),
    ];
    const changed = sourcesAfterRenamingGood(survey, "dairy", "milk", [
      ...studyCells(),
      ...others,
      cell("its elasticities", "elasticities", "system: of panel\nat: {prices: {dairy: 1}, x: 1}\n"),
      cell("of it", "text", "{of panel: eta, dairy} and {panel: mean share, dairy}"),
      cell("both", "slutsky", "system: base\nat: {prices: {dairy: 1, milk: 2}, x: 1}\n"),
      cell("unreadable", "slutsky", "system: base\nat: {prices: {dairy: 1\n"),
    ]);
    expect([...changed.keys()]).toEqual(["s"]);
  });
});
