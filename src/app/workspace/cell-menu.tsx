import { Menu } from "../../components/menu.tsx";
import type { MenuEntry } from "../../components/menu-entries.ts";

/** What there is to do with a cell beside editing it; what is absent is not offered. */
export interface CellActions {
  /** Present for those who may change the study; a cell at an end has one way to move only. */
  readonly changes?: {
    readonly rename: () => void;
    readonly remove: () => void;
    readonly duplicate?: () => void;
    readonly moveUp?: () => void;
    readonly moveDown?: () => void;
    readonly uploads?: () => void;
  };
  /** Folds the band to a line, or unfolds it. */
  readonly fold?: { readonly words: string; readonly go: () => void };
  readonly history?: () => void;
  /** Of a system: the others it can be set beside. */
  readonly compareWith?: readonly { readonly name: string; readonly go: () => void }[];
}

/** What can be done with a cell beside editing it. */
export function CellMenu({
  name,
  actions: { changes, fold, history, compareWith = [] },
}: {
  name: string;
  actions: CellActions;
}) {
  const entry = (key: string, words: string, onSelect?: () => void): MenuEntry => ({
    key,
    words,
    onSelect: onSelect ?? (() => {}),
    disabled: onSelect === undefined,
  });
  const groups = [
    [
      ...(changes ? [entry("rename", "Rename", changes.rename)] : []),
      ...(changes?.duplicate ? [entry("duplicate", "Duplicate", changes.duplicate)] : []),
      ...(fold ? [entry("fold", fold.words, fold.go)] : []),
      ...(changes?.duplicate
        ? [entry("up", "Move up", changes.moveUp), entry("down", "Move down", changes.moveDown)]
        : []),
    ],
    compareWith.map((other) => entry(`compare ${other.name}`, `Compare with ${other.name}`, other.go)),
    [
      ...(changes?.uploads ? [entry("uploads", "Uploads of the study", changes.uploads)] : []),
      ...(history ? [entry("history", "History of this cell", history)] : []),
    ],
    changes ? [entry("remove", "Remove", changes.remove)] : [],
  ].filter((entries) => entries.length > 0);
  if (groups.length === 0) return null;
  return <Menu trigger="More" label={`More for ${name}`} className="switch-word type-small" groups={groups} />;
}
