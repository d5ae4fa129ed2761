import type { Awareness } from "y-protocols/awareness";
import { type PresentPerson, type StampedPresence, stampedPresence } from "../../shared/schemas/sync.ts";

/** Which of the people's colours (`--who-a` to `--who-d`): you are always a; beyond four people they repeat, dashed. */
export interface PersonColour {
  readonly letter: "a" | "b" | "c" | "d";
  readonly dashed: boolean;
}

const OTHERS = ["b", "c", "d"] as const;

export function colourOf(person: Pick<PresentPerson, "id" | "colour">, you?: PresentPerson): PersonColour {
  if (person.id === you?.id) return { letter: "a", dashed: false };
  // The others are counted without you, so that three of them never share a colour.
  const place = you !== undefined && person.colour > you.colour ? person.colour - 1 : person.colour;
  return { letter: OTHERS[place % OTHERS.length], dashed: place >= OTHERS.length };
}

/** A presence state as it came, with the colours the editor draws its caret in. */
export function withColours(state: unknown, you?: PresentPerson): unknown {
  const read = stampedPresence.safeParse(state);
  if (!read.success) return null;
  const colour = `var(--who-${colourOf(read.data.user, you).letter})`;
  const colorLight = `color-mix(in srgb, ${colour} 22%, transparent)`;
  return { ...read.data, user: { ...read.data.user, color: colour, colorLight } };
}

/** Where someone is, without the caret: it moves too often to draw the page anew. */
export interface Whereabouts {
  readonly client: number;
  readonly person: PresentPerson;
  readonly cell: string | null;
  readonly typing: boolean;
}

/** The others' windows; the same array as before when nobody has gone elsewhere. */
export function whereabouts(awareness: Awareness, before: readonly Whereabouts[]): readonly Whereabouts[] {
  const now: Whereabouts[] = [];
  for (const [client, state] of awareness.getStates()) {
    if (client === awareness.clientID) continue;
    const { user, cell, typing } = state as StampedPresence;
    const { id, name, role, colour } = user;
    now.push({ client, person: { id, name, role, colour }, cell: cell ?? null, typing: typing ?? false });
  }
  now.sort((a, b) => a.client - b.client);
  return JSON.stringify(now) === JSON.stringify(before) ? before : now;
}
