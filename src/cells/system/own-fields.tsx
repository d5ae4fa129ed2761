import { INTERACTION_NAMES, PRICE_INDEX_NAMES } from "../../../shared/systems/names.ts";
import { CheckGroup, RadioGroup } from "../form/choices.tsx";
import { asChoices, ChoiceField } from "../form/fields.tsx";
import { NumberField } from "../form/number-field.tsx";
import type { PartProps } from "./section.tsx";

/** Keys that belong to one form alone: a change of form takes them away. */
export const OWN_KEYS: Readonly<Record<string, readonly string[]>> = {
  "la-aids": ["index", "differences"],
  aids: ["alpha0"],
  quaids: ["alpha0"],
  les: ["errors"],
  easi: ["degree", "interactions", "real expenditure"],
};

/** What only the chosen form asks: its index, constant, errors, Engel curves. */
export function OwnFields({ form, written, readOnly }: PartProps & { form: string }) {
  if (form === "la-aids") return <IndexField written={written} readOnly={readOnly} />;
  if (form === "aids" || form === "quaids") return <AlphaNought written={written} readOnly={readOnly} />;
  if (form === "les") return <ErrorsField written={written} readOnly={readOnly} />;
  return form === "easi" ? <EasiFields written={written} readOnly={readOnly} /> : null;
}

function IndexField({ written, readOnly }: PartProps) {
  return (
    <ChoiceField
      label="Index"
      value={written.text("index")}
      choices={asChoices(PRICE_INDEX_NAMES)}
      none="tornqvist"
      readOnly={readOnly}
      onChange={(value) => written.write([["index"], value || undefined])}
    />
  );
}

function AlphaNought({ written, readOnly }: PartProps) {
  return (
    <NumberField
      label="α₀, held fixed"
      path={["alpha0"]}
      written={written}
      readOnly={readOnly}
      otherwise={readOnly ? "0" : ""}
    />
  );
}

function ErrorsField({ written, readOnly }: PartProps) {
  return (
    <RadioGroup
      legend="Errors stand on"
      value={written.text("errors") || "shares"}
      readOnly={readOnly}
      onChange={(value) => written.write([["errors"], value === "shares" ? undefined : value])}
      choices={[
        { value: "shares", label: "shares of the budget" },
        { value: "expenditures", label: "expenditures" },
      ]}
    />
  );
}

function EasiFields({ written, readOnly }: PartProps) {
  return (
    <>
      <NumberField
        label="Degree"
        path={["degree"]}
        written={written}
        readOnly={readOnly}
        otherwise={readOnly ? "3" : ""}
      />
      <CheckGroup
        legend="Interactions"
        values={written.list("interactions")}
        choices={asChoices(INTERACTION_NAMES)}
        readOnly={readOnly}
        onChange={(values) => written.write([["interactions"], values.length > 0 ? values : undefined])}
      />
      <RadioGroup
        legend="Real expenditure"
        value={written.text("real expenditure") || "exact"}
        readOnly={readOnly}
        onChange={(value) => written.write([["real expenditure"], value === "exact" ? undefined : value])}
        choices={[
          { value: "exact", label: "exact, the implicit utility" },
          { value: "approximate", label: "approximate, deflated by mean shares" },
        ]}
      />
    </>
  );
}
