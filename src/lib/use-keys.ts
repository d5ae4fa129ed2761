import { useEffect, useRef } from "react";
import { commandOf, type KeyCommand, type KeyPlace } from "./keys.ts";

/** What a command does; false when it does not act here after all, and the key is left to others. */
// biome-ignore lint/suspicious/noConfusingVoidType: most commands return nothing
export type KeyActions<P extends KeyPlace> = Readonly<Record<KeyCommand<P>, (event: KeyboardEvent) => void | false>>;

/** Whether the key is another part's already: a dialog's, a list's. */
const isTaken = (target: EventTarget | null) =>
  target instanceof HTMLElement && target.closest("[role=dialog], [role=menu]") !== null;

export const isField = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement && (target.isContentEditable || /^(INPUT|TEXTAREA|SELECT)$/.test(target.tagName));

/** Handles a place's keys on the whole page, an action for each of its commands. */
export function useKeys<P extends KeyPlace>(place: P, actions: KeyActions<P>): void {
  const latest = useRef(actions);
  useEffect(() => {
    latest.current = actions;
  });
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.defaultPrevented || isTaken(event.target)) return;
      const command = commandOf(place, event);
      if (command && latest.current[command](event) !== false) event.preventDefault();
    };
    document.addEventListener("keydown", onKeyDown);
    return () => document.removeEventListener("keydown", onKeyDown);
  }, [place]);
}
