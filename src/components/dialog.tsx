import { Dialog as Primitive } from "radix-ui";
import type { ReactNode } from "react";

interface DialogProps {
  readonly onClose: () => void;
  readonly title: string;
  /** A sentence or two below the title; read with it. */
  readonly lede?: ReactNode;
  /** As wide as the screen allows: for tables. */
  readonly wide?: boolean;
  readonly children: ReactNode;
}

/** A page laid over the page: recto, an ink edge, no shadow. Escape and *Close* leave it. */
export function Dialog({ onClose, title, lede, wide = false, children }: DialogProps) {
  return (
    <Primitive.Root open onOpenChange={(next) => !next && onClose()}>
      <Primitive.Portal>
        <Primitive.Overlay className="dialog-cover" />
        <Primitive.Content
          className={`dialog popover ${wide ? "dialog-wide" : ""}`}
          {...(!lede && { "aria-describedby": undefined })}
        >
          <div className="flex items-baseline justify-between gap-6">
            <Primitive.Title className="type-title">{title}</Primitive.Title>
            <Primitive.Close className="word shrink-0">Close</Primitive.Close>
          </div>
          {lede && <Primitive.Description className="type-prose pt-2 text-ink2">{lede}</Primitive.Description>}
          <div className="pt-5">{children}</div>
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}
