import { useId } from "react";
import { ANCHOR_KINDS, type AnchorKind } from "../../../shared/schemas/remarks.ts";

const GROUPS: Readonly<Record<AnchorKind, string>> = {
  verdict: "Verdicts",
  row: "Rows of the table",
  entry: "Entries of the table",
  key: "Keys of the source",
};

interface AboutChoiceProps {
  readonly places: readonly string[];
  readonly value: string | undefined;
  readonly onChange: (anchor: string | undefined) => void;
}

/** What a remark speaks of: the cell as a whole, or a place in its finding or source. */
export function AboutChoice({ places, value, onChange }: AboutChoiceProps) {
  const id = useId();
  // A place that has gone from the page meanwhile stays chosen.
  const all = value === undefined || places.includes(value) ? places : [value, ...places];
  if (all.length === 0) return null;
  return (
    <>
      <label htmlFor={id} className="type-small block pt-2 text-ink2">
        About
      </label>
      <select
        id={id}
        className="field-line type-small"
        value={value ?? ""}
        onChange={(event) => onChange(event.target.value || undefined)}
      >
        <option value="">the cell as a whole</option>
        {ANCHOR_KINDS.map((kind) => {
          const own = all.filter((place) => place.startsWith(`${kind} `));
          return (
            own.length > 0 && (
              <optgroup key={kind} label={GROUPS[kind]}>
                {own.map((place) => (
                  <option key={place} value={place}>
                    {place.slice(kind.length + 1)}
                  </option>
                ))}
              </optgroup>
            )
          );
        })}
      </select>
    </>
  );
}
