import type { StudyStatus } from "../../shared/schemas/status.ts";
import type { PresentPerson } from "../../shared/schemas/sync.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import type { Undone } from "./own-edits.ts";
import type { Whereabouts } from "./people.ts";

export type ConnectionState =
  | { readonly state: "connecting" }
  | { readonly state: "connected" }
  /** `since` in milliseconds since 1970; `editsKept` have not reached the server. */
  | { readonly state: "working alone"; readonly since: number; readonly editsKept: number }
  | { readonly state: "refused"; readonly code: number; readonly sentence: string };

/** `everything`: also what an earlier visit left in this browser. */
export interface StoredState {
  readonly everything: boolean;
  readonly unstored: number;
}

/** Everything a page shows of a study's document, as it is now. A part that has not changed is the same object as before. */
export interface StudySnapshot {
  readonly connection: ConnectionState;
  readonly stored: StoredState;
  readonly readOnly: boolean;
  /** The document is here, from this browser or from the server. */
  readonly loaded: boolean;
  readonly cells: readonly CellSource[];
  /** The last the server has sent; none until something has changed since the server started. */
  readonly status?: StudyStatus;
  readonly you?: PresentPerson;
  /** Everyone with the study open, readers included. */
  readonly people: readonly PresentPerson[];
  /** How often the server has said that the remarks are others now. */
  readonly remarksTold: number;
  /** Where the others are. */
  readonly whereabouts: readonly Whereabouts[];
  /** What undoing or redoing last came to. */
  readonly undone?: Undone;
}

export function emptySnapshot(readOnly: boolean): StudySnapshot {
  return {
    connection: { state: "connecting" },
    stored: { everything: false, unstored: 0 },
    readOnly,
    loaded: false,
    cells: [],
    people: [],
    remarksTold: 0,
    whereabouts: [],
  };
}

/** A value with listeners; whoever is told reads it anew. */
export class Observed<T extends object> {
  #value: T;
  readonly #listeners = new Set<() => void>();

  constructor(value: T) {
    this.#value = value;
  }

  readonly get = (): T => this.#value;

  readonly subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  set(part: Partial<T>): void {
    this.#value = { ...this.#value, ...part };
    for (const listener of this.#listeners) listener();
  }
}
