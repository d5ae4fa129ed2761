import { DropdownMenu as Primitive } from "radix-ui";
import type { ReactNode } from "react";

export interface MenuEntry {
  readonly key: string;
  readonly words: ReactNode;
  readonly onSelect: () => void;
  readonly disabled?: boolean;
  /** One of several of which one is in use. */
  readonly inUse?: boolean;
}

interface MenuProps {
  /** The word that opens it. */
  readonly trigger: ReactNode;
  readonly className?: string;
  readonly label?: string;
  /** Groups are parted by a hairline. */
  readonly groups: readonly (readonly MenuEntry[])[];
  readonly align?: "start" | "end";
}

/** A list of words that opens from a word. */
export function Menu({ trigger, className = "word", label, groups, align = "end" }: MenuProps) {
  const filled = groups.filter((entries) => entries.length > 0);
  return (
    <Primitive.Root modal={false}>
      <Primitive.Trigger className={className} aria-label={label}>
        {trigger}
      </Primitive.Trigger>
      <Primitive.Portal>
        <Primitive.Content align={align} sideOffset={6} collisionPadding={8} className="popover menu" loop>
          {filled.map((entries, index) => (
            <Primitive.Group key={index} className={index > 0 ? "border-rule border-t" : ""}>
              {entries.map((entry) => (
                <Primitive.Item
                  key={entry.key}
                  disabled={entry.disabled}
                  onSelect={entry.onSelect}
                  className="menu-entry"
                  aria-current={entry.inUse || undefined}
                >
                  {entry.words}
                  {entry.inUse && <span className="type-small pl-4 text-current">in use</span>}
                </Primitive.Item>
              ))}
            </Primitive.Group>
          ))}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}
