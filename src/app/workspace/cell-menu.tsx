import { Menu } from "../../components/menu.tsx";
import type { MenuEntry } from "../../components/menu-entries.ts";

export interface CellActions {
  readonly rename: () => void;
  readonly moveUp?: () => void;
  readonly moveDown?: () => void;
  readonly uploads?: () => void;
  readonly history?: () => void;
  /** Of a system: the others it can be set beside. */
  readonly compareWith?: readonly { readonly name: string; readonly go: () => void }[];
  readonly remove: () => void;
}

/** What can be done with a cell beside editing it. */
export function CellMenu({ name, actions }: { name: string; actions: CellActions }) {
  const entry = (key: string, words: string, onSelect?: () => void): MenuEntry => ({
    key,
    words,
    onSelect: onSelect ?? (() => {}),
    disabled: onSelect === undefined,
  });
  return (
    <Menu
      trigger="More"
      label={`More for ${name}`}
      className="switch-word type-small"
      groups={[
        [
          entry("rename", "Rename", actions.rename),
          entry("up", "Move up", actions.moveUp),
          entry("down", "Move down", actions.moveDown),
        ],
        (actions.compareWith ?? []).map((other) =>
          entry(`compare ${other.name}`, `Compare with ${other.name}`, other.go),
        ),
        [
          ...(actions.uploads ? [entry("uploads", "Uploads of the study", actions.uploads)] : []),
          ...(actions.history ? [entry("history", "History of this cell", actions.history)] : []),
        ],
        [entry("remove", "Remove", actions.remove)],
      ]}
    />
  );
}
