import type { PresentPerson } from "../../../shared/schemas/sync.ts";
import { listWords } from "../../../shared/study/words.ts";
import { colourOf, type PersonColour, type Whereabouts } from "../../sync/index.ts";

/** Someone who has the study open, with where they are. */
export interface Present {
  readonly person: PresentPerson;
  readonly colour: PersonColour;
  readonly isYou: boolean;
  /** Ids of the cells they are in, one for each window. */
  readonly cells: readonly string[];
}

/** Everyone present, you first. */
export function presentPeople(
  people: readonly PresentPerson[],
  whereabouts: readonly Whereabouts[],
  you: PresentPerson | undefined,
): Present[] {
  return people
    .map((person) => ({
      person,
      colour: colourOf(person, you),
      isYou: person.id === you?.id,
      cells: [...new Set(whereabouts.flatMap((one) => (one.person.id === person.id && one.cell ? [one.cell] : [])))],
    }))
    .toSorted((a, b) => Number(b.isYou) - Number(a.isYou) || a.person.colour - b.person.colour);
}

export const firstName = (name: string) => name.trim().split(/\s+/)[0] ?? name;

/** Who else is typing in a cell, once each. */
export function typists(
  cellId: string,
  whereabouts: readonly Whereabouts[],
  you: PresentPerson | undefined,
): PresentPerson[] {
  const there = whereabouts.filter(({ cell, typing, person }) => cell === cellId && typing && person.id !== you?.id);
  return [...new Map(there.map(({ person }) => [person.id, person])).values()];
}

/** "Tomás is typing here". */
export function typingInWords(people: readonly PresentPerson[]): string {
  return `${listWords(people.map(({ name }) => firstName(name)))} ${people.length === 1 ? "is" : "are"} typing here`;
}
