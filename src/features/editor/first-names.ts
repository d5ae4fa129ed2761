import type { Awareness } from "y-protocols/awareness";

interface Stated {
  readonly user?: { readonly name?: string };
}

/** The same awareness, with first names only: a flag on a caret has room for no more. */
export function withFirstNames(awareness: Awareness): Awareness {
  const shortened = (state: Stated) => {
    const name = state.user?.name?.trim().split(/\s+/)[0];
    return name === undefined ? state : { ...state, user: { ...state.user, name } };
  };
  return Object.create(awareness, {
    getStates: { value: () => new Map([...awareness.getStates()].map(([id, state]) => [id, shortened(state)])) },
  }) as Awareness;
}
