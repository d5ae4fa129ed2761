import { columnHead, hasEstimates, type LabelledTable, rowHead, type TableCell, type TableRow } from "./table.ts";

const LATEX: Record<string, string> = {
  "\\": "\\textbackslash{}",
  "&": "\\&",
  "%": "\\%",
  $: "\\$",
  "#": "\\#",
  _: "\\_",
  "{": "\\{",
  "}": "\\}",
  "~": "\\textasciitilde{}",
  "^": "\\textasciicircum{}",
  "<": "$<$",
  ">": "$>$",
  "\u2212": "$-$",
  "\u2009": "\\,",
  "×": "$\\times$",
  "²": "$^2$",
  α: "$\\alpha$",
  β: "$\\beta$",
  γ: "$\\gamma$",
  Γ: "$\\Gamma$",
  λ: "$\\lambda$",
  μ: "$\\mu$",
  χ: "$\\chi$",
};
const POWER = /10([⁻]?[⁰¹²³⁴⁵⁶⁷⁸⁹]+)/g;
const SUPERSCRIPT = "⁰¹²³⁴⁵⁶⁷⁸⁹";

function asciiExponent(raised: string): string {
  return [...raised].map((character) => (character === "⁻" ? "-" : SUPERSCRIPT.indexOf(character))).join("");
}

/** Text for LaTeX: specials escaped, the product's signs and letters as mathematics. */
export function latexText(text: string): string {
  const parts = text.split(POWER);
  // split() with one group alternates text and exponents.
  return parts
    .map((part, index) =>
      index % 2 === 1
        ? `$10^{${asciiExponent(part)}}$`
        : [...part].map((character) => LATEX[character] ?? character).join(""),
    )
    .join("");
}

function estimate(cell: TableCell): string {
  if (cell.kind === "empty") return "";
  if (cell.kind === "text") return latexText(cell.text);
  const unit = cell.kind === "number" && cell.unit !== undefined ? ` ${latexText(cell.unit)}` : "";
  return latexText(cell.printed) + unit;
}

function lines(row: TableRow): string[] {
  const line = (label: string, cells: readonly string[]) => `${[label, ...cells].join(" & ")} \\\\`;
  const first = line(latexText(rowHead(row)), row.cells.map(estimate));
  const above = row.total ? ["\\midrule"] : [];
  if (!hasEstimates(row)) return [...above, first];
  const errors = row.cells.map((cell) => (cell.kind === "estimate" ? `(${latexText(cell.printedError)})` : ""));
  return [...above, first, line("", errors)];
}

/** A table for a paper: booktabs rules, estimates over standard errors in parentheses, notes below. */
export function tableLatex(table: LabelledTable): string {
  const firstRow = table.rows[0]?.cells ?? [];
  const columns = table.columns.map((_, index) => (firstRow[index]?.kind === "text" ? "l" : "r")).join("");
  const head = [table.corner, ...table.columns.map(columnHead)].map(latexText).join(" & ");
  return [
    "% needs \\usepackage{booktabs}",
    "\\begin{table}",
    "\\centering",
    `\\caption{${latexText(table.title)}}`,
    `\\label{tab:${table.name}}`,
    `\\begin{tabular}{l${columns}}`,
    "\\toprule",
    `${head} \\\\`,
    "\\midrule",
    ...table.rows.flatMap(lines),
    "\\bottomrule",
    "\\end{tabular}",
    ...table.notes.map((note) => `\\par\\smallskip{\\footnotesize ${latexText(note)}}`),
    "\\end{table}",
    "",
  ].join("\n");
}
