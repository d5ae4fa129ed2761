import { HYPOTHESIS_NAMES } from "../../../shared/schemas/tests.ts";
import { CheckGroup, RadioGroup } from "../form/choices.tsx";
import { asChoices, ChoiceField, TextField, Unreadable } from "../form/fields.tsx";
import { readWritten } from "../form/written.ts";
import type { FormProps } from "../types.ts";

/** A tests cell as a form: what is tested, of which system or data, at which level. */
export function TestsForm(props: FormProps) {
  const { context, readOnly } = props;
  const written = readWritten("tests", props);
  if (!written.readable) return <Unreadable />;
  const named = (kind: "system" | "data") => context.cells.filter((cell) => cell.kind === kind).map(({ name }) => name);
  const reads = written.value("data") !== undefined && written.value("system") === undefined ? "data" : "system";
  const choose = (next: string) => {
    if (next === reads) return;
    const [from, to] = next === "data" ? (["system", "data"] as const) : (["data", "system"] as const);
    written.write([[from], undefined], [["of"], undefined], [[to], named(to).at(-1) ?? ""]);
  };
  const field = (kind: "system" | "data", label: string) => (
    <ChoiceField
      label={label}
      value={written.text(kind)}
      choices={asChoices(named(kind))}
      readOnly={readOnly}
      onChange={(value) => written.write([[kind], value])}
    />
  );
  return (
    <div>
      <RadioGroup
        legend="Tests of"
        value={reads}
        readOnly={readOnly}
        onChange={choose}
        choices={[
          { value: "system", label: "a system’s restrictions", below: field("system", "System") },
          { value: "data", label: "choices alone, without a model", below: field("data", "Data") },
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
          <TextField
            label="Level"
            value={written.text("level") || "0.05"}
            numeric
            readOnly={readOnly}
            onCommit={(value) => written.write([["level"], value === "" ? undefined : asNumber(value)])}
          />
        </>
      )}
    </div>
  );
}

/** A number where one was typed; anything else is written as it is, for the text to mark. */
function asNumber(text: string): number | string {
  const number = Number(text);
  return Number.isFinite(number) ? number : text;
}
