import { CellField } from "../form/cell-field.tsx";
import { RadioGroup } from "../form/choices.tsx";
import { Unreadable } from "../form/fields.tsx";
import { PointField } from "../form/point-fields.tsx";
import { readWritten } from "../form/written.ts";
import type { FormProps } from "../types.ts";

/** A slutsky cell as a form: which system, at which point, in which form. */
export function SlutskyForm(props: FormProps) {
  const { context, readOnly } = props;
  const written = readWritten("slutsky", props);
  if (!written.readable) return <Unreadable />;
  return (
    <div>
      <CellField kind="system" written={written} readOnly={readOnly} context={context} />
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
