import type { RefereeCopy, SealedAlso, SealedContent, SealedSlutsky } from "../../../shared/schemas/referee-copy.ts";
import { canonicalJson } from "../../../shared/study/canonical-json.ts";
import { coefficientTable } from "../../../shared/tables/coefficients.ts";
import { covarianceCsv } from "../../../shared/tables/covariance.ts";
import { tableCsv } from "../../../shared/tables/csv.ts";
import { eigenvalueTable } from "../../../shared/tables/eigenvalues.ts";
import { elasticityTables } from "../../../shared/tables/elasticities.ts";
import { firstStepTables } from "../../../shared/tables/first-steps.ts";
import { tableLatex } from "../../../shared/tables/latex.ts";
import { rowAccountingTable } from "../../../shared/tables/row-accounting.ts";
import { compensatedTable, slutskyTable } from "../../../shared/tables/slutsky-matrix.ts";
import type { LabelledTable } from "../../../shared/tables/table.ts";
import { testsTables } from "../../../shared/tables/tests-tables.ts";

/** A file made in the browser from the sealed content. */
export interface SealedFile {
  readonly label: string;
  readonly format: "CSV" | "LaTeX" | "YAML" | "JSON";
  readonly name: string;
  readonly type: string;
  readonly text: string;
}

/** The specification as one study file: every cell's source under its name and kind. */
export function specificationYaml({ study, cells }: SealedContent): string {
  const indented = (source: string) =>
    source
      .trimEnd()
      .split("\n")
      .map((line) => (line === "" ? "" : `    ${line}`))
      .join("\n");
  // A JSON string is a YAML one too: any title and any name may stand in quotes.
  const blocks = cells.sources.map(
    ({ name, kind, source }) => `  ${JSON.stringify(name)}:\n    kind: ${kind}\n${indented(source)}\n`,
  );
  return `study: ${JSON.stringify(study.title)}\ncells:\n${blocks.join("")}`;
}

function matrixTables(slutsky: SealedSlutsky): LabelledTable[] {
  return [
    slutskyTable(slutsky, "share"),
    slutskyTable(slutsky, "quantity"),
    ...(slutsky.at.eigenvalues.length > 0 ? [eigenvalueTable(slutsky)] : []),
    compensatedTable(slutsky),
  ];
}

/** Every table of a further finding, the one to take first at the head. */
function alsoTables(one: SealedAlso): LabelledTable[] {
  switch (one.kind) {
    case "system":
      return [coefficientTable(one.finding), ...firstStepTables(one.finding)];
    case "tests":
      return testsTables(one.finding);
    case "elasticities":
      return elasticityTables(one.finding);
    case "slutsky":
      return matrixTables(one.finding);
  }
}

function tablesLatex({ slutsky, system, accounting, also = [] }: SealedContent): string {
  return [
    ...matrixTables(slutsky),
    coefficientTable(system),
    rowAccountingTable(accounting),
    ...also.flatMap(alsoTables),
  ]
    .map(tableLatex)
    .join("\n");
}

/** Everything a copy can be downloaded as. JSON is the very text whose SHA-256 is the fingerprint. */
export function sealedFiles({ fingerprint, content }: RefereeCopy): SealedFile[] {
  const stem = `referee-copy-${fingerprint.slice(0, 8)}`;
  const csv = (label: string, name: string, text: string): SealedFile => ({
    label,
    format: "CSV",
    name: `${stem}-${name}.csv`,
    type: "text/csv;charset=utf-8",
    text,
  });
  const { slutsky, system, also = [] } = content;
  const alsoCsv = (one: SealedAlso) => {
    if (one.kind === "system") return covarianceCsv(one.finding);
    return alsoTables(one).map(tableCsv).join("\n");
  };
  return [
    csv("Matrix, with standard errors", "matrix", tableCsv(slutskyTable(slutsky, slutsky.form))),
    csv("Coefficients, with full covariance", "coefficients", covarianceCsv(system)),
    ...also.map((one, i) => csv(`${one.name}, ${one.kind}`, `also-${i + 1}-${one.kind}`, alsoCsv(one))),
    { label: "Tables", format: "LaTeX", name: `${stem}.tex`, type: "application/x-tex", text: tablesLatex(content) },
    {
      label: "Specification",
      format: "YAML",
      name: `${stem}.yaml`,
      type: "application/yaml",
      text: specificationYaml(content),
    },
    {
      label: "Everything sealed",
      format: "JSON",
      name: `${stem}.json`,
      type: "application/json",
      text: canonicalJson(content),
    },
  ];
}
