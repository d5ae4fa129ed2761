import { isField, useKeys } from "../../lib/use-keys.ts";
import type { StudyConnection } from "../../sync/index.ts";

/** Anywhere in a study but in a field, which undoes its own typing: the person's last step, wherever it was; and the sheet of keys. */
export function useStudyKeys(connection: StudyConnection, onHelp: () => void): void {
  const outside = (act: () => void) => (event: KeyboardEvent) => {
    if (isField(event.target)) return false;
    act();
  };
  useKeys("anywhere", {
    help: outside(onHelp),
    undo: outside(() => connection.undoStep()),
    redo: outside(() => connection.redoStep()),
  });
}
