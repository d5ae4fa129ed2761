import { RadioGroup } from "../form/choices.tsx";
import { TextField } from "../form/fields.tsx";
import { asNumber } from "../form/point-fields.tsx";
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
              <TextField
                label="Row"
                value={written.text("curvature", "at", "row")}
                numeric
                readOnly={readOnly}
                onCommit={(value) => written.write([["curvature", "at", "row"], asNumber(value)])}
              />
            ),
          },
        ]}
      />
      {chosen !== "nowhere" && (
        <TextField
          label="Rank there"
          value={written.text("curvature", "rank") || (readOnly ? "the highest" : "")}
          numeric
          readOnly={readOnly}
          onCommit={(value) => written.write([["curvature", "rank"], value === "" ? undefined : asNumber(value)])}
        />
      )}
    </Section>
  );
}
