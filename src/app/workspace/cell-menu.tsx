import { Menu } from "../../components/menu.tsx";
import type { MenuEntry } from "../../components/menu-entries.ts";

export interface CellActions {
  readonly rename: () => void;
  readonly moveUp?: () => void;
  readonly moveDown?: () => void;
  readonly uploads?: () => void;
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
        actions.uploads ? [entry("uploads", "Uploads of the study", actions.uploads)] : [],
        [entry("remove", "Remove", actions.remove)],
      ]}
    />
  );
}
