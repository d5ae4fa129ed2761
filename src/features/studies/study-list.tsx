import type { StudySummary } from "../../../shared/schemas/resources.ts";
import { StudyEntry } from "./study-entry.tsx";

interface StudyListProps {
  readonly studies: readonly StudySummary[];
  readonly you: string;
  /** There are studies, and none of them is shown. */
  readonly hidden: boolean;
}

export function StudyList({ studies, you, hidden }: StudyListProps) {
  return (
    <section aria-label="Your studies">
      <div className="study-entry study-heads type-small text-ink2" aria-hidden="true">
        <span>Latest change first</span>
        <span>Cells, and what each reads</span>
      </div>
      {studies.length === 0 ? (
        <p className="type-finding border-line border-t py-6">
          {hidden
            ? "No study answers to this."
            : "No study yet. A study begins with a title and a file of purchases; the rest follows in it."}
        </p>
      ) : (
        <ul className="border-line border-b">
          {studies.map((study) => (
            <StudyEntry key={study.id} study={study} you={you} />
          ))}
        </ul>
      )}
    </section>
  );
}
