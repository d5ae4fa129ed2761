import type { KeyboardEvent } from "react";
import { commandOf } from "../../lib/keys.ts";

interface MoveHandleProps {
  readonly good: string;
  readonly onMove: (by: 1 | -1) => void;
  /** The good is dragged, or no longer. */
  readonly onDrag: (dragged: boolean) => void;
}

/** Moves a good among the others: dragged by the pointer, or by the arrow keys while it has the focus. */
export function MoveHandle({ good, onMove, onDrag }: MoveHandleProps) {
  const onKeyDown = (event: KeyboardEvent) => {
    const command = commandOf("handle", event);
    if (!command) return;
    event.preventDefault();
    event.stopPropagation();
    onMove(command === "up" ? -1 : 1);
  };
  return (
    <button
      type="button"
      draggable
      aria-label={`Move ${good}: arrow up or down`}
      title="Drag, or press the arrow keys"
      className="flex min-h-6 min-w-6 cursor-grab items-center justify-center text-ink3 hover:text-accent max-[599px]:min-h-11 max-[599px]:min-w-11"
      onKeyDown={onKeyDown}
      onDragStart={(event) => {
        event.dataTransfer.effectAllowed = "move";
        event.dataTransfer.setData("text/plain", good);
        onDrag(true);
      }}
      onDragEnd={() => onDrag(false)}
    >
      <svg aria-hidden="true" viewBox="0 0 10 12" width="10" height="12">
        <path d="M1 3H9M1 6H9M1 9H9" stroke="currentColor" strokeWidth="1.2" />
      </svg>
    </button>
  );
}
