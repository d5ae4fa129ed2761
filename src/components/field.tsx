import { type ComponentProps, type ReactNode, useId } from "react";

interface FieldProps extends ComponentProps<"input"> {
  readonly label: string;
  /** What is wrong with it, in a sentence. */
  readonly fault?: string;
  readonly hint?: string;
  /** Stands at the field's right end, within it. */
  readonly beside?: ReactNode;
}

/** A labelled field; a fault is read with it and marked by more than colour. */
export function Field({ label, fault, hint, beside, className = "", ...rest }: FieldProps) {
  const id = useId();
  const told = [fault && `${id}-fault`, hint && `${id}-hint`].filter(Boolean).join(" ");
  return (
    <div className={className}>
      <label htmlFor={id} className="type-small block pb-1 text-ink2">
        {label}
      </label>
      <div className="relative">
        <input
          id={id}
          className={`field ${beside ? "pr-16" : ""}`}
          aria-invalid={fault ? true : undefined}
          aria-describedby={told || undefined}
          {...rest}
        />
        {beside && <span className="absolute inset-y-0 right-3 flex items-center">{beside}</span>}
      </div>
      {fault && <Fault id={`${id}-fault`}>{fault}</Fault>}
      {hint && (
        <p id={`${id}-hint`} className="type-small pt-1 text-ink3">
          {hint}
        </p>
      )}
    </div>
  );
}

/** A sentence about what is wrong, with the square of failure before it. */
export function Fault({ id, children }: { id?: string; children: ReactNode }) {
  return (
    <p id={id} role="alert" className="type-small flex items-baseline gap-2 pt-1.5 text-fail">
      <svg aria-hidden="true" viewBox="0 0 11 11" width="10" height="10" className="shrink-0 translate-y-px">
        <path d="M1.2 1.2H9.8V9.8H1.2ZM1.2 9.8L9.8 1.2" fill="none" stroke="currentColor" strokeWidth="1.5" />
      </svg>
      <span>{children}</span>
    </p>
  );
}
