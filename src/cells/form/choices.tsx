import { type ReactNode, useId } from "react";
import { type Choice, FormRow } from "./fields.tsx";

interface RadioProps {
  readonly legend: string;
  readonly value: string;
  readonly choices: readonly (Choice & { readonly below?: ReactNode })[];
  readonly onChange: (value: string) => void;
  readonly readOnly: boolean;
}

/** One of a few, all in sight; what a choice needs of its own stands below it while it is chosen. */
export function RadioGroup({ legend, value, choices, onChange, readOnly }: RadioProps) {
  const name = useId();
  return (
    <fieldset className="py-1.5">
      <legend className="mb-1 text-[0.875rem]/[1.25rem] text-ink2">{legend}</legend>
      {choices.map((choice) => (
        <div key={choice.value}>
          <label className="flex min-h-6 cursor-pointer items-baseline gap-3 py-0.5 text-[0.875rem]/[1.25rem] max-[599px]:min-h-11">
            <input
              type="radio"
              name={name}
              value={choice.value}
              checked={value === choice.value}
              disabled={readOnly}
              onChange={() => onChange(choice.value)}
              className="m-0 size-2.5 shrink-0 appearance-none rounded-full border border-ctl checked:border-ink checked:bg-ink"
            />
            {choice.label}
          </label>
          {value === choice.value && choice.below && <div className="mb-1 ml-5.5">{choice.below}</div>}
        </div>
      ))}
    </fieldset>
  );
}

interface ChecksProps {
  readonly legend: string;
  readonly values: readonly string[];
  readonly choices: readonly Choice[];
  readonly onChange: (values: string[]) => void;
  readonly readOnly: boolean;
  readonly mono?: boolean;
}

/** Any of several, written in the order offered; values that are not offered are kept and shown. */
export function CheckGroup({ legend, values, choices, onChange, readOnly, mono = false }: ChecksProps) {
  const offered = choices.map((choice) => choice.value);
  const unknown = values.filter((value) => !offered.includes(value));
  const all = [...choices, ...unknown.map((value) => ({ value, label: `${value}, not known here` }))];
  if (readOnly) {
    return (
      <FormRow label={legend}>
        <span className={mono ? "font-mono text-[0.8125rem]/[1.375rem]" : ""}>{values.join(", ") || "none"}</span>
      </FormRow>
    );
  }
  const toggle = (value: string, on: boolean) => {
    const next = new Set(values);
    if (on) next.add(value);
    else next.delete(value);
    onChange(all.map((choice) => choice.value).filter((word) => next.has(word)));
  };
  return (
    <fieldset className="grid grid-cols-[minmax(5.5rem,7.25rem)_minmax(0,1fr)] items-start gap-x-3 py-1">
      <legend className="float-left w-full pt-0.5 text-[0.875rem]/[1.25rem] text-ink2 max-[599px]:pt-3">
        {legend}
      </legend>
      <div className="flex flex-wrap gap-x-4">
        {all.length === 0 && <span className="text-[0.875rem]/[1.25rem] text-ink2">none to choose</span>}
        {all.map((choice) => (
          <label
            key={choice.value}
            className={`flex min-h-6 cursor-pointer items-center gap-1.5 text-[0.875rem]/[1.25rem] max-[599px]:min-h-11 ${mono ? "font-mono text-[0.8125rem]" : ""}`}
          >
            <input
              type="checkbox"
              checked={values.includes(choice.value)}
              onChange={(event) => toggle(choice.value, event.target.checked)}
              className="m-0 size-3.5 shrink-0 accent-ink"
            />
            {choice.label}
          </label>
        ))}
      </div>
    </fieldset>
  );
}
