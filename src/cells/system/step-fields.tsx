import { CheckGroup, RadioGroup } from "../form/choices.tsx";
import { asChoices } from "../form/fields.tsx";
import { type PartProps, Section } from "./section.tsx";

const TWO_STEP = "two-step";

/** First steps: an endogenous total by its instruments, and goods not bought. */
export function StepFields({ written, readOnly, columns }: PartProps & { columns: readonly string[] }) {
  const zeros = written.value("zeros") !== undefined;
  const chooseColumns = (values: string[]) =>
    written.write([["zeros"], values.length > 0 ? { [TWO_STEP]: values } : TWO_STEP]);
  return (
    <Section
      title="Endogenous expenditure, zeros"
      keys={["instruments", "zeros"]}
      written={written}
      readOnly={readOnly}
    >
      <CheckGroup
        legend="Instruments"
        values={written.list("instruments")}
        choices={asChoices(columns)}
        mono
        readOnly={readOnly}
        onChange={(values) => written.write([["instruments"], values.length > 0 ? values : undefined])}
      />
      <RadioGroup
        legend="Goods not bought"
        value={zeros ? TWO_STEP : "none"}
        readOnly={readOnly}
        onChange={(value) => written.write([["zeros"], value === "none" ? undefined : TWO_STEP])}
        choices={[
          { value: "none", label: "as shares of zero" },
          {
            value: TWO_STEP,
            label: "in two steps, whether and then how much",
            below: (
              <CheckGroup
                legend="Whether, by"
                values={written.list("zeros", TWO_STEP)}
                choices={asChoices(columns)}
                mono
                readOnly={readOnly}
                onChange={chooseColumns}
              />
            ),
          },
        ]}
      />
    </Section>
  );
}
