import type { SealedMethods } from "../../shared/schemas/referee-copy.ts";
import type { SystemFinding } from "../../shared/schemas/system.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import type { UploadShape } from "../../shared/study/columns.ts";
import { resolveCells } from "../../shared/study/resolve.ts";
import { formulasUsedOn } from "../../shared/study/unconditional-of.ts";
import { referenceInWords } from "../../shared/tables/cite.ts";
import { methodsParagraph, paragraphBibtex } from "../../shared/tables/methods/paragraph.ts";
import { conflict } from "../errors.ts";

interface SystemCell {
  readonly cell: CellSource;
  readonly finding: SystemFinding;
}

/** The methods paragraph of each system, from its specification with all it is like, and its current finding. */
export function methodsToSeal(
  systems: readonly SystemCell[],
  sources: readonly CellSource[],
  uploads: readonly UploadShape[],
): SealedMethods[] {
  const resolved = resolveCells(sources, uploads);
  return systems.map(({ cell: { id, name, source }, finding }) => {
    const now = resolved.find((one) => one.id === id);
    const specification = now?.source === source ? now.specification : undefined;
    if (specification?.kind !== "system") throw conflict(`${name} is changing; seal it again.`);
    const data = resolved.find((one) => one.name === specification.data)?.specification;
    const unconditional = formulasUsedOn(name, resolved);
    const paragraph = methodsParagraph({
      specification,
      finding,
      unconditional,
      ...(data?.kind === "data" && { data }),
    });
    const { text, references } = paragraph;
    return { system: name, text, references: references.map(referenceInWords), bibtex: paragraphBibtex(paragraph) };
  });
}
