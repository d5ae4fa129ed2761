import { useId, useMemo } from "react";
import type { Upload } from "../../../shared/schemas/resources.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { formulasUsedOn } from "../../../shared/study/unconditional-of.ts";
import { referenceInWords } from "../../../shared/tables/cite.ts";
import {
  methodsParagraph,
  paragraphBibtex,
  paragraphWithReferences,
} from "../../../shared/tables/methods/paragraph.ts";
import { Word } from "../../components/button.tsx";
import { useCopying } from "../../components/use-copying.ts";
import { useFinding } from "../../features/findings/api/get-finding.ts";
import { resolveHere } from "./reading.ts";
import type { Standing } from "./standing.ts";

interface PaperWordsProps {
  readonly studyId: string;
  readonly standing: Standing;
  readonly cells: readonly CellSource[];
  readonly uploads: readonly Upload[];
}

/** A system's methods as the paper would say them: from its specification, with the numbers of its finding once there is one. */
export default function PaperWords({ studyId, standing, cells, uploads }: PaperWordsProps) {
  const { cell, fingerprint } = standing;
  const { data } = useFinding(studyId, fingerprint);
  const headingId = useId();
  const { said, copy } = useCopying();
  const asked = useMemo(() => {
    const resolved = resolveHere(cells, uploads);
    const own = resolved.find(({ id }) => id === cell.id)?.specification;
    if (own?.kind !== "system") return undefined;
    const below = resolved.find(({ name }) => name === own.data)?.specification;
    return {
      specification: own,
      unconditional: formulasUsedOn(cell.name, resolved),
      ...(below?.kind === "data" && { data: below }),
    };
  }, [cells, uploads, cell.id, cell.name]);
  if (!asked) return null;
  const finding = fingerprint && data?.finding.kind === "system" ? data.finding : undefined;
  const paragraph = methodsParagraph({ ...asked, ...(finding && { finding }) });
  const copyText = (text: string) => copy(() => navigator.clipboard.writeText(text));
  const of = <span className="sr-only"> of the methods of {cell.name}</span>;
  return (
    <section className="paper-words" aria-labelledby={headingId}>
      <div className="type-small flex flex-wrap items-baseline justify-between gap-x-4 gap-y-1 pb-1.5">
        <h3 id={headingId} className="text-ink2">
          As the paper would say it <span className="sr-only">of {cell.name}</span>
        </h3>
        <p className="no-print flex flex-wrap items-baseline gap-x-4">
          <span role="status" className="text-ink2">
            {said}
          </span>
          <Word onClick={() => void copyText(paragraphWithReferences(paragraph))}>Copy with references{of}</Word>
          <Word onClick={() => void copyText(paragraphBibtex(paragraph))}>BibTeX{of}</Word>
        </p>
      </div>
      <p className="font-serif text-[0.96875rem]/[1.5rem] text-pretty">{paragraph.text}</p>
      {paragraph.references.length > 0 && (
        <details className="type-small mt-2 text-ink2">
          <summary className="cursor-pointer">
            {paragraph.references.length === 1 ? "1 reference" : `${paragraph.references.length} references`}
          </summary>
          <ul className="mt-1.5 grid gap-1">
            {paragraph.references.map((key) => (
              <li key={key} className="pl-[1.2em] -indent-[1.2em]">
                {referenceInWords(key)}
              </li>
            ))}
          </ul>
        </details>
      )}
    </section>
  );
}
