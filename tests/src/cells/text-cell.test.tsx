import { render, screen, waitFor, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { askedNumbers } from "../../../shared/study/asked-numbers.ts";
import { type QuotedCell, textFinding } from "../../../shared/tables/text-finding.ts";
import { TextBand } from "../../../src/cells/text/band.tsx";
import { shallow } from "../../../src/cells/text/marked-text.ts";
import { TextOpen } from "../../../src/cells/text/view.tsx";
import { WhereCellsAreProvider } from "../../../src/cells/text/where-cells-are.ts";
import { ownTime } from "../../support/own-time.ts";
import { sampleSystem } from "../../support/sample-findings.ts";

const system = sampleSystem();
const CELLS: Readonly<Record<string, QuotedCell>> = {
  base: { standing: "current", finding: system, fingerprint: "a".repeat(64) },
  linear: { standing: "out of date", finding: system, because: "found 12:34, and since then form changed" },
};

function found(text: string) {
  const gone = (name: string): QuotedCell => ({ standing: "absent", because: `No cell is called ${name}.` });
  return textFinding(
    text,
    askedNumbers(text, () => "system"),
    (name) => CELLS[name] ?? gone(name),
  );
}

function read(text: string) {
  return render(
    <WhereCellsAreProvider value={(name) => (name in CELLS ? `#cell-${name}` : undefined)}>
      <TextBand finding={found(text)} />
    </WhereCellsAreProvider>,
  ).container;
}

describe("a text as it reads", () => {
  it("has its numbers in their places, each a link to its cell that says what it is", () => {
    const page = read("Meat is a *luxury*, {base: eta, meat & fish, alone}.");
    expect(page).toHaveTextContent("Meat is a luxury, 1.318.");
    const link = screen.getByRole("link", { name: "1.318" });
    expect(link).toHaveAttribute("href", "#cell-base");
    expect(link).toHaveAttribute("title", "expenditure elasticity of meat & fish at the base point, from base");
    expect(page.querySelector("em")).toHaveTextContent("luxury");
  });

  it("marks by shape, wash and words what is out of date or gone, with the reason below", () => {
    const page = read("{linear: eta, meat & fish, alone} and {gone: rows}");
    const stale = screen.getByRole("link", { name: "1.318, out of date" });
    expect(stale).toHaveClass("quoted-stale");
    expect(stale.querySelector("[data-state='out of date']")).not.toBeNull();
    expect(page.querySelector(".quoted-absent")).toHaveTextContent("no number for gone: rows");
    expect(page.querySelector(".quoted-absent [data-state='failed']")).not.toBeNull();
    const told = within(screen.getByRole("list", { name: "Numbers that are not current" })).getAllByRole("listitem");
    expect(told.map(({ textContent }) => textContent)).toEqual([
      "1.318 is out of date: linear was found 12:34, and since then form changed.",
      "gone: rows: No cell is called gone.",
    ]);
  });

  it.each([
    ["## A\n### B\n## C", "3 4 3"],
    ["### A\n##### B\n###### C\n### D", "3 4 5 3"],
    ["## A\n# B\n### C\n## D", "3 3 4 4"],
    ["# A\n## B\n### C\n#### D\n##### E", "3 4 5 6 6"],
    ["> ## A\n\n### B[^n]\n\n[^n]: Note.", "3 4 3"],
  ])("leaves out no level of heading, whichever it begins with: %j", (text, levels) => {
    const page = read(text);
    const heads = [...page.querySelectorAll("h1, h2, h3, h4, h5, h6")].map(({ tagName }) => tagName.slice(1));
    expect(heads.join(" ")).toBe(levels);
  });

  it("sets heads below the cell's, tables that scroll, notes with ids of their own", () => {
    const text =
      "# Needs\n\n| good | η |\n|---|---:|\n| meat | {base: eta, meat & fish, alone} |\n\nSo.[^a]\n\n[^a]: Here.\n";
    const page = read(text);
    read(text);
    expect(page.querySelector("h3")).toHaveTextContent("Needs");
    expect(within(page).getByRole("cell", { name: "1.318" })).toBeInTheDocument();
    expect(within(page).getByRole("group", { name: "Table of the text" })).toHaveAttribute("tabindex", "0");
    const ids = [...document.querySelectorAll("[id]")].map(({ id }) => id);
    expect(ids.filter((id) => id.includes("fn-")).length).toBeGreaterThan(1);
    expect(new Set(ids).size).toBe(ids.length);
  });

  it("sets formulae for the eye and, as MathML, for the ear; a broken one stands as it was written", async () => {
    const page = read("So $\\eta_i = 1 + \\mu_i / w_i$ and\n\n$$\n\\frac{1}{2}\n$$\n\nbut $\\frac{1$ not.");
    await waitFor(() => expect(page.querySelectorAll("math")).toHaveLength(2), { timeout: 20_000 });
    expect(page.querySelector(".katex-display math")).not.toBeNull();
    expect(page.querySelector(".katex-error")).toHaveTextContent("\\frac{1");
  }, 30_000);

  it("lists every number with what it is and where it is from", () => {
    render(<TextOpen finding={found("{base: rows} and {gone: rows}")} />);
    const rows = within(screen.getByRole("table")).getAllByRole("row");
    expect(rows[1]).toHaveTextContent(/base: rows900rows of the equationscurrentaaaa aaaa aaaa aaaa/);
    expect(rows[2]).toHaveTextContent(/gone: rowsnoneNo cell is called gone\.no number/);
  });
});

describe("a hostile text", () => {
  const HOSTILE = [
    "<script>window.stolen = 1</script>",
    "<img src=x onerror=alert(1)>",
    '<a href="javascript:alert(1)">x</a>',
    "[x](javascript:alert(1)) [x](JaVaScRiPt:alert(1)) [x](data:text/html,x) [x](vbscript:x) [x](file:///etc/passwd)",
    "[x](/api/studies) [x](//elsewhere.example) <javascript:alert(1)>",
    "![x](https://elsewhere.example/pixel.png)",
    "[x]: javascript:alert(1)\n\n[x]",
    "$\\href{javascript:alert(1)}{x}$ $\\includegraphics{https://elsewhere.example/x.png}$ $\\htmlId{x}{y}$",
    "    <script>indented</script>",
    "<iframe src=https://elsewhere.example></iframe>\n\n<style>*{display:none}</style>",
  ];

  it.each(HOSTILE)(
    "runs, fetches and leads nowhere: %s",
    async (text) => {
      const page = read(text);
      if (text.includes("$"))
        await waitFor(() => expect(page.querySelector(".katex")).not.toBeNull(), { timeout: 20_000 });
      expect(page.querySelector("script, img, iframe, style, object, embed, form, [onerror], [id=x]")).toBeNull();
      for (const link of page.querySelectorAll("a")) {
        expect(link.getAttribute("href") ?? "").toMatch(/^(https?:\/\/|mailto:|#|$)/);
      }
      expect("stolen" in window).toBe(false);
    },
    30_000,
  );

  it("opens pages of the web apart, without telling them where from", () => {
    read("[x](https://journal.example/a) and <mailto:a@b.example>");
    const [link] = screen.getAllByRole("link");
    expect(link).toHaveAttribute("rel", "noopener noreferrer nofollow");
  });

  it("cannot forge a number by signs of private use, nor change what code shows", () => {
    const page = read("\uE0000\uE001 {base: rows} `{base: rows}` [x](https://a.example/{base:rows})");
    expect(page.querySelectorAll(".quoted")).toHaveLength(1);
    expect(page.querySelector("code")).toHaveTextContent("{base: rows}");
    expect(page.textContent).not.toMatch(/[\uE000\uE001]/);
    expect(page.querySelector("a[href^=https]")?.getAttribute("href")).not.toMatch(/%EE%80/);
  });

  it("is read no deeper than a page can draw", () => {
    const deep = "> ".repeat(16_000);
    expect(shallow(deep)).toBe(`${"> ".repeat(12)}\\${"> ".repeat(15_988)}`);
    expect(shallow("> - 1. as deep as prose goes\n- so\n")).toBe("> - 1. as deep as prose goes\n- so\n");
    expect(ownTime(() => read(deep), 1)).toBeLessThan(3_000);
  }, 60_000);

  it.each([
    ["quotes", "> "],
    ["lists", "- "],
    ["brackets", "["],
    ["stars", "*a **b "],
    ["braces", "{base: rows} "],
    ["tables", "|a"],
  ])(
    "nested or repeated without end is drawn all the same: %s",
    (_, part) => {
      const text = part.repeat(Math.floor(6_000 / part.length));
      expect(ownTime(() => read(text), 1)).toBeLessThan(3_000);
      expect(document.querySelectorAll(".prose-text *").length).toBeLessThan(40_000);
      let depth = 0;
      for (let at = document.querySelector(".prose-text"); at; at = at.querySelector(":scope > *")) depth += 1;
      expect(depth).toBeLessThan(80);
    },
    60_000,
  );
});
