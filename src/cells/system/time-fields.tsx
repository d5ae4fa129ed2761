import { CheckGroup } from "../form/choices.tsx";
import { TextField } from "../form/fields.tsx";
import { asNumber, NumberField } from "../form/number-field.tsx";
import { type PartProps, Section } from "./section.tsx";

const KEYS = ["differences", "season", "trend"] as const;

/** What a time column makes possible: changes instead of levels, a season, a trend. */
export function TimeFields({ form, written, readOnly }: PartProps & { form: string }) {
  const flags = [
    { key: "differences", label: "changes from period to period", offered: form === "la-aids" },
    { key: "trend", label: "a linear trend", offered: true },
  ].filter(({ key, offered }) => offered || written.value(key) !== undefined);
  const set = flags.filter(({ key }) => written.value(key) === true).map(({ key }) => key);
  const period = written.text("season", "period");
  return (
    <Section title="Over time" keys={KEYS} written={written} readOnly={readOnly}>
      <CheckGroup
        legend="Use"
        values={set}
        choices={flags.map(({ key, label }) => ({ value: key, label }))}
        readOnly={readOnly}
        onChange={(next) => written.write(...flags.map(({ key }) => [[key], next.includes(key) || undefined] as const))}
      />
      <TextField
        label="Season, periods"
        value={period}
        numeric
        readOnly={readOnly}
        onCommit={(value) =>
          written.write(value === "" ? [["season"], undefined] : [["season", "period"], asNumber(value)])
        }
      />
      {period !== "" && (
        <NumberField label="Harmonics" path={["season", "harmonics"]} written={written} readOnly={readOnly} />
      )}
      {period !== "" && !readOnly && (
        <p className="type-small pb-1 text-ink2">
          Harmonics are pairs of sine and cosine. Left empty, every period of the season but one has a dummy.
        </p>
      )}
    </Section>
  );
}
