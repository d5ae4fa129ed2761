import { ChoiceField } from "../form/fields.tsx";
import { NumberField } from "../form/number-field.tsx";
import { type PartProps, Section } from "./section.tsx";

const PLACES = [
  { value: "nowhere", label: "no point" },
  { value: "base point", label: "the base point" },
  { value: "mean", label: "the sample mean" },
  { value: "row", label: "a row of the data" },
];

/** Where negativity is imposed, and with which rank. */
export function CurvatureFields(part: PartProps) {
  const { written, readOnly } = part;
  const at = written.value("curvature", "at");
  const isRow = typeof at === "object" && at !== null;
  const chosen = written.value("curvature") === undefined ? "nowhere" : isRow ? "row" : String(at ?? "base point");
  const choose = (next: string) => {
    if (next === "nowhere") written.write([["curvature"], undefined]);
    else written.write([["curvature", "at"], next === "row" ? { row: 1 } : next]);
  };
  return (
    <Section title="Negativity imposed" keys={["curvature"]} {...part}>
      <ChoiceField label="Imposed at" value={chosen} choices={PLACES} readOnly={readOnly} onChange={choose} />
      {chosen === "row" && <NumberField label="Row" path={["curvature", "at", "row"]} required {...part} />}
      {chosen !== "nowhere" && (
        <NumberField
          label="Rank there"
          path={["curvature", "rank"]}
          otherwise={readOnly ? "the highest" : ""}
          {...part}
        />
      )}
      {chosen !== "nowhere" && !readOnly && written.text("curvature", "rank") === "" && (
        <p className="type-small pb-1 text-ink2">Left empty, one less than there are goods.</p>
      )}
    </Section>
  );
}
