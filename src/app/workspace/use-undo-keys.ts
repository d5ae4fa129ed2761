import { useEffect } from "react";
import type { StudyConnection } from "../../sync/index.ts";

/** A field undoes its own typing; a dialog is no place from which to change what lies below it. */
const isElsewhere = (target: EventTarget | null) =>
  target instanceof HTMLElement &&
  (target.isContentEditable ||
    /^(INPUT|TEXTAREA|SELECT)$/.test(target.tagName) ||
    target.closest("[role=dialog], [role=menu]") !== null);

/** Ctrl and Z anywhere in a study but in a field: the person's last step, wherever it was; with Shift, or Y, it is done again. */
export function useUndoKeys(connection: StudyConnection): void {
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.defaultPrevented || !(event.ctrlKey || event.metaKey) || event.altKey) return;
      const key = event.key.toLowerCase();
      if ((key !== "z" && key !== "y") || isElsewhere(event.target)) return;
      event.preventDefault();
      if (key === "y" || event.shiftKey) connection.redoStep();
      else connection.undoStep();
    };
    document.addEventListener("keydown", onKeyDown);
    return () => document.removeEventListener("keydown", onKeyDown);
  }, [connection]);
}
