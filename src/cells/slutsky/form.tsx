import { RadioGroup } from "../form/choices.tsx";
import { asChoices, ChoiceField, Unreadable } from "../form/fields.tsx";
import { PointField } from "../form/point-fields.tsx";
import { readWritten } from "../form/written.ts";
import type { FormProps } from "../types.ts";

/** A slutsky cell as a form: which system, at which point, in which form. */
export function SlutskyForm(props: FormProps) {
  const { context, readOnly } = props;
  const written = readWritten("slutsky", props);
  if (!written.readable) return <Unreadable />;
  const systems = context.cells.filter((cell) => cell.kind === "system").map((cell) => cell.name);
  return (
    <div>
      <ChoiceField
        label="System"
        value={written.text("system")}
        choices={asChoices(systems)}
        readOnly={readOnly}
        onChange={(value) => written.write([["system"], value])}
      />
      <PointField written={written} readOnly={readOnly} context={context} otherwise="base point" />
      <RadioGroup
        legend="Entries"
        value={written.text("form") || "share"}
        readOnly={readOnly}
        onChange={(value) => written.write([["form"], value])}
        choices={[
          { value: "share", label: "share form" },
          { value: "quantity", label: "quantity form" },
        ]}
      />
    </div>
  );
}
