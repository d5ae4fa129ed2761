import type { CellKind, Finding, FindingOf } from "../schemas/cell.ts";
import type { BundledCell } from "../schemas/replication-bundle.ts";
import type { SystemSpecification } from "../schemas/system.ts";
import type { UnconditionalFormula } from "../schemas/two-stage.ts";
import { canonicalJson } from "../study/canonical-json.ts";
import type { CellSource } from "../study/cell-source.ts";
import { removeKey, setKey } from "../study/edit.ts";
import { withoutDraws } from "../study/without-draws.ts";
import { writeStudyFile } from "../study/write-study-file.ts";
import { covarianceCsv } from "../tables/covariance.ts";
import { tableCsv } from "../tables/csv.ts";
import { tableLatex } from "../tables/latex.ts";
import { methodsParagraph, paragraphBibtex, paragraphWithReferences } from "../tables/methods/paragraph.ts";
import { FINDING_TABLES } from "../tables/of-finding.ts";
import { tabledWithoutHouseholds, withoutHouseholds } from "./without-households.ts";

/** A cell that goes into a bundle, with what it found; a text finds nothing that is stored. */
export interface ContentCell {
  readonly cell: Pick<CellSource, "name" | "kind" | "source">;
  readonly fingerprint?: string;
  readonly finding?: Finding;
  /** What is stored in its place where the finding itself is not at hand: the sums of a sealed data cell. */
  readonly sums?: object;
  /** Of a system: what was asked, for its methods paragraph. */
  readonly asked?: SystemSpecification;
  /** Of a system: by which formulas its elasticities are taken to unconditional ones. */
  readonly unconditional?: readonly UnconditionalFormula[];
}

export interface TextPart {
  readonly name: string;
  readonly content: string;
}

export interface ContentAbout {
  readonly title: string;
  readonly lede: string;
  readonly isWithheld: boolean;
  /** The file within the bundle that each data cell reads, by the cell's name. */
  readonly files: Readonly<Record<string, string>>;
}

/** The texts of a bundle, and what its list of contents says of each cell. */
export function bundleContents(
  about: ContentAbout,
  cells: readonly ContentCell[],
): { readonly parts: TextPart[]; readonly listed: BundledCell[] } {
  const study = {
    name: "study.yaml",
    content: writeStudyFile({ ...about, cells: cells.map((one) => readable(one, about)) }),
  };
  const stems = fileStems(cells.map(({ cell }) => cell.name));
  const each = cells.map((one) => partsOf(one, stems.get(one.cell.name)!, about.isWithheld));
  return { parts: [study, ...each.flatMap(({ parts }) => parts)], listed: each.map(({ listed }) => listed) };
}

/** A data cell reads the file that lies in the bundle, whichever version of an upload that was. */
function readable({ cell }: ContentCell, { files }: ContentAbout): ContentCell["cell"] {
  const file = cell.kind === "data" ? files[cell.name] : undefined;
  if (file === undefined) return cell;
  return { ...cell, source: setKey(removeKey(cell.source, ["version"]), ["upload"], file) };
}

function partsOf(one: ContentCell, stem: string, isWithheld: boolean): { parts: TextPart[]; listed: BundledCell } {
  const { cell, fingerprint, finding } = one;
  const listed = { name: cell.name, kind: cell.kind as CellKind, ...(fingerprint !== undefined && { fingerprint }) };
  const at = `findings/${stem}.json`;
  if (finding === undefined) {
    if (one.sums === undefined) return { parts: [], listed: { ...listed, tables: [] } };
    const sums = { name: at, content: `${canonicalJson(one.sums)}\n` };
    return { parts: [sums], listed: { ...listed, finding: at, tables: [] } };
  }
  const file = { name: at, content: `${canonicalJson(leaving(finding, isWithheld))}\n` };
  const tabled = isWithheld ? tabledWithoutHouseholds(finding) : finding;
  const tables = tabled === undefined ? [] : tableParts(tabled, stem);
  return {
    parts: [file, ...tables, ...systemParts(one, stem)],
    listed: { ...listed, finding: file.name, tables: tables.map(({ name }) => name) },
  };
}

function leaving(finding: Finding, isWithheld: boolean): object {
  if (isWithheld) return withoutHouseholds(finding);
  return finding.kind === "system" ? withoutDraws(finding) : finding;
}

function tableParts<K extends CellKind>(finding: FindingOf<K>, stem: string): TextPart[] {
  const tables = FINDING_TABLES[finding.kind as K](finding);
  return tables.flatMap((table, at) => {
    const name = `tables/${stem}${tables.length > 1 ? `-${at + 1}` : ""}`;
    return [
      { name: `${name}.csv`, content: tableCsv(table) },
      { name: `${name}.tex`, content: tableLatex(table) },
    ];
  });
}

function systemParts({ finding, asked, unconditional = [] }: ContentCell, stem: string): TextPart[] {
  if (finding?.kind !== "system") return [];
  const covariance = { name: `coefficients/${stem}.csv`, content: covarianceCsv(finding) };
  if (asked === undefined) return [covariance];
  const paragraph = methodsParagraph({ specification: asked, finding, unconditional });
  return [
    covariance,
    { name: `methods/${stem}.txt`, content: paragraphWithReferences(paragraph) },
    { name: `methods/${stem}.bib`, content: paragraphBibtex(paragraph) },
  ];
}

/** What the files of each cell are called: its name without spaces, and told apart where systems of files would not. */
export function fileStems(names: readonly string[]): ReadonlyMap<string, string> {
  const taken = new Set<string>();
  const stems = new Map<string, string>();
  for (const name of names) {
    const plain = name.replaceAll(" ", "_");
    let stem = plain;
    for (let number = 2; taken.has(stem.toLowerCase()); number++) stem = `${plain}-${number}`;
    taken.add(stem.toLowerCase());
    stems.set(name, stem);
  }
  return stems;
}
