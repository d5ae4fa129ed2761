import type { ReactNode } from "react";

export interface MenuEntry {
  readonly key: string;
  readonly words: ReactNode;
  readonly onSelect: () => void;
  readonly disabled?: boolean;
  /** One of several of which one is in use. */
  readonly inUse?: boolean;
}

export interface MenuProps {
  /** The word that opens it. */
  readonly trigger: ReactNode;
  readonly className?: string;
  readonly label?: string;
  /** Groups are parted by a hairline. */
  readonly groups: readonly (readonly MenuEntry[])[];
  readonly align?: "start" | "end";
}

/** How a menu was asked for: with the keyboard, the first entry has the focus. */
export type Asked = "pointer" | "keyboard";
