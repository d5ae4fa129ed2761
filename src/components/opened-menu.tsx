import { DropdownMenu as Primitive } from "radix-ui";
import { useEffect, useRef } from "react";
import type { Asked, MenuProps } from "./menu-entries.ts";

/** A menu from the first time it is asked for: it opens at once. */
export default function OpenedMenu({
  trigger,
  className = "word",
  label,
  groups,
  align = "end",
  asked,
}: MenuProps & { asked: Asked }) {
  const filled = groups.filter((entries) => entries.length > 0);
  const content = useRef<HTMLDivElement>(null);
  useEffect(() => {
    // The key that asked was pressed before there was a menu to hear it.
    if (asked === "keyboard") {
      requestAnimationFrame(() =>
        content.current?.querySelector<HTMLElement>("[role=menuitem]:not([data-disabled])")?.focus(),
      );
    }
  }, [asked]);
  return (
    <Primitive.Root modal={false} defaultOpen>
      <Primitive.Trigger className={className} aria-label={label}>
        {trigger}
      </Primitive.Trigger>
      <Primitive.Portal>
        <Primitive.Content
          ref={content}
          align={align}
          sideOffset={6}
          collisionPadding={8}
          className="popover menu"
          loop
        >
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
