import { HYPOTHESIS_NAMES } from "../../../shared/schemas/tests.ts";
import { CellField, namesOf } from "../form/cell-field.tsx";
import { CheckGroup, RadioGroup } from "../form/choices.tsx";
import { asChoices, Unreadable } from "../form/fields.tsx";
import { NumberField } from "../form/number-field.tsx";
import { readWritten } from "../form/written.ts";
import type { FormProps } from "../types.ts";

/** A tests cell as a form: what is tested, of which system or data, at which level. */
export function TestsForm(props: FormProps) {
  const { context, readOnly } = props;
  const written = readWritten("tests", props);
  if (!written.readable) return <Unreadable />;
  const reads = written.value("data") !== undefined && written.value("system") === undefined ? "data" : "system";
  const choose = (next: string) => {
    if (next === reads) return;
    const [from, to] = next === "data" ? (["system", "data"] as const) : (["data", "system"] as const);
    written.write([[from], undefined], [["of"], undefined], [[to], namesOf(context, to).at(-1) ?? ""]);
  };
  const field = (kind: "system" | "data") => (
    <CellField kind={kind} written={written} readOnly={readOnly} context={context} />
  );
  return (
    <div>
      <RadioGroup
        legend="Tests of"
        value={reads}
        readOnly={readOnly}
        onChange={choose}
        choices={[
          { value: "system", label: "a system’s restrictions", below: field("system") },
          { value: "data", label: "choices alone, without a model", below: field("data") },
        ]}
      />
      {reads === "system" && (
        <>
          <CheckGroup
            legend="Hypotheses"
            values={written.list("of")}
            choices={asChoices(HYPOTHESIS_NAMES)}
            readOnly={readOnly}
            onChange={(values) => written.write([["of"], values.length > 0 ? values : undefined])}
          />
          {written.list("of").length === 0 && (
            <p className="type-small pb-1 text-ink2">All that the system admits, while none is chosen.</p>
          )}
          <NumberField label="Level" path={["level"]} written={written} readOnly={readOnly} otherwise="0.05" />
        </>
      )}
    </div>
  );
}
