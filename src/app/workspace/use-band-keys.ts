import { useEffect } from "react";
import { letterKeysAct } from "../../lib/preferences.ts";

interface BandKeys {
  readonly move: (by: 1 | -1) => void;
  readonly open: () => void;
  readonly swap: () => void;
  /** Begins a remark on the band in focus. */
  readonly remark: () => void;
  /** From a field back to its band. */
  readonly leave: () => void;
}

const isField = (target: EventTarget | null) =>
  target instanceof HTMLElement && (target.isContentEditable || /^(INPUT|TEXTAREA|SELECT)$/.test(target.tagName));

/** Whether the key is already another part's: a dialog's, a menu's, a matrix's. */
const isTaken = (target: EventTarget | null) =>
  target instanceof HTMLElement && target.closest("[role=dialog], [role=menu], [role=grid]") !== null;

/** The keys of the study's page. Single letters act only while no field has the focus, and can be turned off. */
export function useBandKeys(keys: BandKeys): void {
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.defaultPrevented || isTaken(event.target)) return;
      if (event.key === "Escape") return keys.leave();
      if (isField(event.target)) return;
      if (event.ctrlKey || event.metaKey || event.altKey) return;
      if (event.key === "Enter" && event.target instanceof HTMLElement && event.target.matches("section.band")) {
        return keys.open();
      }
      if (!letterKeysAct()) return;
      const act = { j: () => keys.move(1), k: () => keys.move(-1), t: keys.swap, r: keys.remark }[
        event.key.toLowerCase()
      ];
      if (!act) return;
      event.preventDefault();
      act();
    };
    document.addEventListener("keydown", onKeyDown);
    return () => document.removeEventListener("keydown", onKeyDown);
  }, [keys]);
}
