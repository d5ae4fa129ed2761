import { type ComponentProps, useId } from "react";
import { Fault } from "./field.tsx";

interface LongFieldProps extends ComponentProps<"textarea"> {
  readonly label: string;
  readonly fault?: string;
  readonly hint?: string;
}

/** A labelled field of several lines. */
export function LongField({ label, fault, hint, rows = 3, ...rest }: LongFieldProps) {
  const id = useId();
  const told = [fault && `${id}-fault`, hint && `${id}-hint`].filter(Boolean).join(" ");
  return (
    <div>
      <label htmlFor={id} className="type-small block pb-1 text-ink2">
        {label}
      </label>
      <textarea
        id={id}
        rows={rows}
        className="field"
        aria-invalid={fault ? true : undefined}
        aria-describedby={told || undefined}
        {...rest}
      />
      {fault && <Fault id={`${id}-fault`}>{fault}</Fault>}
      {hint && (
        <p id={`${id}-hint`} className="type-small pt-1 text-ink3">
          {hint}
        </p>
      )}
    </div>
  );
}
