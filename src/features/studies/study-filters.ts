import type { StudySummary } from "../../../shared/schemas/resources.ts";

/** The list's filters, in the order of the page. */
export const STUDY_FILTERS = [
  { key: "all", words: "All", keeps: (study: StudySummary) => !study.isPutAway },
  { key: "yours", words: "Yours", keeps: (study: StudySummary) => !study.isPutAway && study.role === "owner" },
  {
    key: "shared",
    words: "Shared with you",
    keeps: (study: StudySummary) => !study.isPutAway && study.role !== "owner",
  },
  {
    key: "sealed",
    words: "With a referee copy",
    keeps: (study: StudySummary) => !study.isPutAway && study.sealedAt !== undefined,
  },
  { key: "put away", words: "Put away", keeps: (study: StudySummary) => study.isPutAway === true },
] as const;

export type StudyFilter = (typeof STUDY_FILTERS)[number]["key"] | "deleted";

/** Letters without their accents and case, so that "tomas" finds Tomás. */
const plain = (text: string) => text.normalize("NFD").replace(/\p{M}/gu, "").toLowerCase();

/** The studies a filter keeps in which every word asked for stands: in title, question, cells or people. */
export function shownStudies(studies: readonly StudySummary[], filter: StudyFilter, find: string): StudySummary[] {
  const keeps = STUDY_FILTERS.find(({ key }) => key === filter)?.keeps ?? (() => true);
  const words = plain(find).split(/\s+/).filter(Boolean);
  return studies
    .filter(keeps)
    .filter((study) => words.every((word) => searched(study).includes(word)))
    .toSorted((a, b) => b.changedAt.localeCompare(a.changedAt));
}

function searched({ title, lede, cells, people }: StudySummary): string {
  return plain([title, lede, ...cells.map(({ name }) => name), ...people.map(({ name }) => name)].join("\n"));
}
