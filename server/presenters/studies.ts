import type { Person, StudySummary } from "../../shared/schemas/resources.ts";
import type { PersonRow } from "../services/people.ts";
import type { StudyView } from "../services/studies.ts";

export function presentStudy({ study, role, people, cells, sealedAt, isPutAway }: StudyView): StudySummary {
  return {
    id: study.id,
    title: study.title,
    lede: study.lede,
    role,
    people: people.map(presentPerson),
    changedAt: study.changedAt.toISOString(),
    cells: cells.map(({ name, state, reads }) => ({ name, state, reads: [...reads] })),
    ...(isPutAway && { isPutAway }),
    ...(sealedAt !== undefined && { sealedAt: sealedAt.toISOString() }),
  };
}

export function presentPerson({ id, name, email, role }: PersonRow): Person {
  return { id, name, email, role };
}
