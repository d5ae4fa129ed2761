import { RadioGroup } from "../form/choices.tsx";
import { NumberField } from "../form/number-field.tsx";
import { type PartProps, Section } from "./section.tsx";

/** Where negativity is imposed, and with which rank. */
export function CurvatureFields({ written, readOnly }: PartProps) {
  const at = written.value("curvature", "at");
  const isRow = typeof at === "object" && at !== null;
  const chosen = written.value("curvature") === undefined ? "nowhere" : isRow ? "row" : String(at ?? "base point");
  const choose = (next: string) => {
    if (next === "nowhere") written.write([["curvature"], undefined]);
    else written.write([["curvature", "at"], next === "row" ? { row: 1 } : next]);
  };
  return (
    <Section title="Negativity imposed" keys={["curvature"]} written={written} readOnly={readOnly}>
      <RadioGroup
        legend="At"
        value={chosen}
        readOnly={readOnly}
        onChange={choose}
        choices={[
          { value: "nowhere", label: "no point" },
          { value: "base point", label: "the base point" },
          { value: "mean", label: "the mean" },
          {
            value: "row",
            label: "a row",
            below: (
              <NumberField
                label="Row"
                path={["curvature", "at", "row"]}
                written={written}
                readOnly={readOnly}
                required
              />
            ),
          },
        ]}
      />
      {chosen !== "nowhere" && (
        <NumberField
          label="Rank there"
          path={["curvature", "rank"]}
          written={written}
          readOnly={readOnly}
          otherwise={readOnly ? "the highest" : ""}
        />
      )}
    </Section>
  );
}
