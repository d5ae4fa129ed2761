import type { Person, StudySummary } from "../../../shared/schemas/resources.ts";
import { counted, listWords } from "../../../shared/study/words.ts";
import type { ShownState } from "../../components/state-shape.tsx";

const STATES: readonly ShownState[] = ["failed", "estimating", "draft", "current", "out of date"];

/** A state as the list may be sent it; a word of a newer server stands as a draft. */
export function shownState(state: string): ShownState {
  return (STATES as readonly string[]).includes(state) ? (state as ShownState) : "draft";
}

/** How many cells stand in each state, those that want attention first: "1 failed", "3 current". */
export function stateCounts(states: readonly ShownState[]): { state: ShownState; words: string }[] {
  return STATES.flatMap((state) => {
    const count = states.filter((other) => other === state).length;
    if (count === 0) return [];
    return [{ state, words: state === "draft" ? counted(count, "draft") : `${count} ${state}` }];
  });
}

const named = (people: readonly Person[], you: string) =>
  people
    .map(({ id, name }) => (id === you ? "You" : name))
    .toSorted((a, b) => Number(b === "You") - Number(a === "You"));

/** Whose it is, and who else is in it: "You own it. 1 coauthor, 3 readers". */
export function belongingInWords({ people, role }: Pick<StudySummary, "people" | "role">, you: string): string {
  const owners = people.filter((person) => person.role === "owner");
  const names = named(owners, you);
  const own = owners.length === 1 && names[0] !== "You" ? "owns" : "own";
  const others = (["coauthor", "reader"] as const).flatMap((kind) => {
    const count = people.filter((person) => person.role === kind && person.id !== you).length;
    return count === 0 ? [] : [counted(count, kind)];
  });
  const sentences = [`${listWords(names)} ${own} it.`];
  if (role !== "owner") sentences.push(`You are a ${role}.`);
  if (others.length > 0) sentences.push(others.join(", "));
  return sentences.join(" ");
}

/** The people of a study as its head names them: "Ilse Marchetti, owner. Tomás Adeyemi, coauthor. 3 readers." */
export function peopleInWords(people: readonly Person[]): string {
  const of = (role: Person["role"]) => people.filter((person) => person.role === role);
  const parts = (["owner", "coauthor"] as const).flatMap((role) => {
    const names = of(role).map(({ name }) => name);
    return names.length === 0 ? [] : [`${listWords(names)}, ${names.length === 1 ? role : `${role}s`}.`];
  });
  const readers = of("reader");
  if (readers.length === 1) parts.push(`${readers[0].name}, reader.`);
  if (readers.length > 1) parts.push(`${readers.length} readers.`);
  return parts.join(" ");
}
