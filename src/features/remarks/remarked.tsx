import { type ReactNode, useMemo, useState } from "react";
import type { Remark } from "../../../shared/schemas/remarks.ts";
import { AnchorProvider, type PlaceLetter, saidId } from "../../components/anchor-mark.tsx";
import { useCellRemarks } from "./api/list-remarks.ts";
import { CellRemarks } from "./cell-remarks.tsx";
import { goTo } from "./go-to.ts";
import { anchorInWords, lettersOf } from "./letters.ts";
import type { RemarkedCell } from "./places.ts";
import type { RemarkSetting } from "./remark-setting.ts";

interface RemarkedProps {
  readonly setting: RemarkSetting;
  readonly cell: RemarkedCell;
  /** An opened cell has no margin: its remarks wait behind a word. */
  readonly opened?: boolean;
  /** The pages of the band. */
  readonly children: ReactNode;
}

/** A band's pages with the remarks on them: their letters in place, and they themselves beside. */
export function Remarked({ setting, cell, opened = false, children }: RemarkedProps) {
  const remarks = useCellRemarks(setting.studyId, cell.id);
  const [isOpen, setOpen] = useState(false);
  const open = useMemo(() => remarks.filter(({ settled }) => !settled), [remarks]);
  const letters = useMemo(() => lettersOf(open), [open]);
  const anchors = useMemo(
    () => ({
      at: lettersByPlace(open, letters),
      follow: (id: string) => {
        setOpen(true);
        // Where remarks are folded, once they are there.
        setTimeout(goTo, 0, saidId(id));
      },
    }),
    [open, letters],
  );
  return (
    <AnchorProvider value={anchors}>
      {children}
      <CellRemarks
        setting={setting}
        cell={cell}
        remarks={remarks}
        letters={letters}
        opened={opened}
        isOpen={isOpen}
        onOpen={setOpen}
      />
    </AnchorProvider>
  );
}

function lettersByPlace(open: readonly Remark[], letters: ReadonlyMap<string, string>) {
  const at = new Map<string, PlaceLetter[]>();
  for (const { id, anchor, author } of open) {
    if (anchor === undefined) continue;
    const letter = letters.get(id) ?? "";
    const label = `Remark ${letter} by ${author.name}, on ${anchorInWords(anchor)}`;
    at.set(anchor, [...(at.get(anchor) ?? []), { id, letter, label }]);
  }
  return at;
}
