import { useCallback, useState } from "react";

const keyOf = (studyId: string) => `tangency-folded/${studyId}`;

function remembered(studyId: string): ReadonlySet<string> {
  try {
    const ids: unknown = JSON.parse(localStorage.getItem(keyOf(studyId)) ?? "[]");
    return new Set(Array.isArray(ids) ? ids.map(String) : []);
  } catch {
    return new Set();
  }
}

function remember(studyId: string, folded: ReadonlySet<string>): void {
  try {
    if (folded.size === 0) localStorage.removeItem(keyOf(studyId));
    else localStorage.setItem(keyOf(studyId), JSON.stringify([...folded]));
  } catch {
    // Kept for this page only, then.
  }
}

/** Which cells this person has folded to a line: their own view of the study, remembered in this browser. */
export function useFolded(studyId: string, cellIds: readonly string[]) {
  const [folded, setFolded] = useState(() => remembered(studyId));
  const fold = useCallback(
    (cellId: string, isFolded: boolean) =>
      setFolded((before) => {
        if (before.has(cellId) === isFolded) return before;
        const now = new Set(before);
        if (isFolded) now.add(cellId);
        else now.delete(cellId);
        // Cells that are gone are forgotten with the next fold.
        remember(studyId, new Set([...now].filter((id) => cellIds.includes(id))));
        return now;
      }),
    [studyId, cellIds],
  );
  return { isFolded: (cellId: string) => folded.has(cellId), fold };
}
