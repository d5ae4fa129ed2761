import { type ComponentProps, useState } from "react";
import { Field } from "../../components/field.tsx";

type PassphraseFieldProps = Omit<ComponentProps<typeof Field>, "label" | "type" | "beside"> & {
  readonly label?: string;
};

/** A passphrase one may look at while typing it. */
export function PassphraseField({ label = "Passphrase", ...props }: PassphraseFieldProps) {
  const [shown, setShown] = useState(false);
  return (
    <Field
      {...props}
      label={label}
      type={shown ? "text" : "password"}
      beside={
        <button type="button" className="word type-small" aria-pressed={shown} onClick={() => setShown(!shown)}>
          {shown ? "Hide" : "Show"} <span className="sr-only">the {label.toLowerCase()}</span>
        </button>
      }
    />
  );
}
