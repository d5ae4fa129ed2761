import { isField, type KeyActions, useKeys } from "../../lib/use-keys.ts";

type Actions = { readonly [C in keyof KeyActions<"study">]: () => void };

/** A matrix has arrows and letters of its own. */
const isInGrid = (target: EventTarget | null) =>
  target instanceof HTMLElement && target.closest("[role=grid]") !== null;

/** Whether the focus is on a band itself, not on something in it. */
const isBand = (target: EventTarget | null) => target instanceof HTMLElement && target.matches("section.band");

/** The keys of the study's page. All but the way back to the band act only while no field has the focus. */
export function useBandKeys(actions: Actions): void {
  const outside = (act: () => void) => (event: KeyboardEvent) => {
    if (isField(event.target) || isInGrid(event.target)) return false;
    act();
  };
  const onBand = (act: () => void) => (event: KeyboardEvent) => {
    if (!isBand(event.target)) return false;
    act();
  };
  useKeys("study", {
    next: outside(actions.next),
    previous: outside(actions.previous),
    // On a link or a button within the band, Enter is theirs.
    open: onBand(actions.open),
    swap: outside(actions.swap),
    fold: outside(actions.fold),
    compare: outside(actions.compare),
    remark: outside(actions.remark),
    rename: outside(actions.rename),
    duplicate: outside(actions.duplicate),
    moveUp: outside(actions.moveUp),
    moveDown: outside(actions.moveDown),
    // Only with the band itself in focus, so that nothing is removed by a key meant for something in it.
    remove: onBand(actions.remove),
    leave: (event) => {
      if (isInGrid(event.target)) return false;
      actions.leave();
    },
  });
}
