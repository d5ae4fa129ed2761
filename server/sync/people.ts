import type { PresentPerson } from "../../shared/schemas/sync.ts";

interface Present {
  readonly person: PresentPerson;
}

/** Everyone with the study open, once each, in the order of their colours. */
export function peopleIn(connections: Iterable<Present>): PresentPerson[] {
  const people = new Map<string, PresentPerson>();
  for (const { person } of connections) people.set(person.id, person);
  return [...people.values()].sort((a, b) => a.colour - b.colour);
}

/** The colour the person has in another window, or the lowest that nobody has. */
export function colourOf(personId: string, connections: Iterable<Present>): number {
  const people = peopleIn(connections);
  const own = people.find(({ id }) => id === personId);
  if (own !== undefined) return own.colour;
  const taken = new Set(people.map(({ colour }) => colour));
  let colour = 0;
  while (taken.has(colour)) colour += 1;
  return colour;
}
