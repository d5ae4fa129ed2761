import { INTERACTION_NAMES, PRICE_INDEX_NAMES, type PriceIndexName } from "../../../shared/systems/names.ts";
import { CheckGroup } from "../form/choices.tsx";
import { DefaultField } from "../form/default-field.tsx";
import { asChoices } from "../form/fields.tsx";
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

const INDICES: Readonly<Record<PriceIndexName, string>> = {
  tornqvist: "Törnqvist",
  stone: "Stone",
  laspeyres: "Laspeyres",
  paasche: "Paasche",
  "lagged stone": "Stone, lagged shares",
};

/** What only the chosen form asks: its index, constant, errors, Engel curves. */
export function OwnFields({ form, ...part }: PartProps & { form: string }) {
  if (form === "la-aids") {
    const choices = PRICE_INDEX_NAMES.map((value) => ({ value, label: INDICES[value] }));
    return <DefaultField label="Index" path={["index"]} otherwise="tornqvist" choices={choices} {...part} />;
  }
  if (form === "aids" || form === "quaids") {
    return <NumberField label="α₀, held fixed" path={["alpha0"]} otherwise="0" {...part} />;
  }
  if (form === "les") {
    const choices = [
      { value: "shares", label: "of shares" },
      { value: "expenditures", label: "of expenditures" },
    ];
    return <DefaultField label="Errors" path={["errors"]} otherwise="shares" choices={choices} {...part} />;
  }
  return form === "easi" ? <EasiFields {...part} /> : null;
}

const REAL = [
  { value: "exact", label: "exact, implicit utility" },
  { value: "approximate", label: "approximate, by mean shares" },
];

function EasiFields(part: PartProps) {
  return (
    <>
      <NumberField label="Degree" path={["degree"]} otherwise="3" {...part} />
      <CheckGroup
        legend="Interactions"
        values={part.written.list("interactions")}
        choices={asChoices(INTERACTION_NAMES)}
        readOnly={part.readOnly}
        onChange={(values) => part.written.write([["interactions"], values.length > 0 ? values : undefined])}
      />
      <DefaultField label="Real expenditure" path={["real expenditure"]} otherwise="exact" choices={REAL} {...part} />
    </>
  );
}
