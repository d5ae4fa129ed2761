import { CheckGroup } from "../form/choices.tsx";
import { asChoices, ChoiceField } from "../form/fields.tsx";
import { type PartProps, Section } from "./section.tsx";

const TWO_STEP = "two-step";

const ZEROS = [
  { value: "none", label: "as shares of zero" },
  { value: TWO_STEP, label: "in two steps" },
];

/** First steps: an endogenous total by its instruments, and goods not bought. */
export function StepFields({ columns, ...part }: PartProps & { columns: readonly string[] }) {
  const { written, readOnly } = part;
  const zeros = written.value("zeros") !== undefined;
  const chooseColumns = (values: string[]) =>
    written.write([["zeros"], values.length > 0 ? { [TWO_STEP]: values } : TWO_STEP]);
  return (
    <Section title="Endogenous expenditure and zeros" keys={["instruments", "zeros"]} {...part}>
      <CheckGroup
        legend="Instruments"
        values={written.list("instruments")}
        choices={asChoices(columns)}
        mono
        readOnly={readOnly}
        onChange={(values) => written.write([["instruments"], values.length > 0 ? values : undefined])}
      />
      <ChoiceField
        label="Goods not bought"
        value={zeros ? TWO_STEP : "none"}
        choices={ZEROS}
        readOnly={readOnly}
        onChange={(value) => written.write([["zeros"], value === "none" ? undefined : TWO_STEP])}
      />
      {zeros && (
        <>
          {!readOnly && (
            <p className="type-small pb-1 text-ink2">
              First whether a good is bought, by prices, expenditure and the columns below; then how much.
            </p>
          )}
          <CheckGroup
            legend="Whether, by"
            values={written.list("zeros", TWO_STEP)}
            choices={asChoices(columns)}
            mono
            readOnly={readOnly}
            onChange={chooseColumns}
          />
        </>
      )}
    </Section>
  );
}
