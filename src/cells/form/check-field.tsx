import { FormRow } from "./fields.tsx";

interface CheckProps {
  readonly label: string;
  readonly checked: boolean;
  readonly onChange: (checked: boolean) => void;
  readonly readOnly: boolean;
}

/** Yes or no. */
export function CheckField({ label, checked, onChange, readOnly }: CheckProps) {
  if (readOnly) {
    return (
      <FormRow label={label}>
        <span className="text-[0.875rem]/[1.25rem]">{checked ? "yes" : "no"}</span>
      </FormRow>
    );
  }
  return (
    <label className="flex min-h-6 cursor-pointer items-center gap-2 py-1 text-[0.875rem]/[1.25rem] text-ink2 max-[599px]:min-h-11">
      <input
        type="checkbox"
        checked={checked}
        onChange={(event) => onChange(event.target.checked)}
        className="m-0 size-3.5 shrink-0 accent-ink"
      />
      {label}
    </label>
  );
}
