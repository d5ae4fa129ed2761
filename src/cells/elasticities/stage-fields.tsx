import { parseCell } from "../../../shared/study/parse-cell.ts";
import { namesOf } from "../form/cell-field.tsx";
import { RadioGroup } from "../form/choices.tsx";
import { asChoices, ChoiceField } from "../form/fields.tsx";
import { dataBelow } from "../form/point-fields.tsx";
import type { Written } from "../form/written.ts";
import type { FormProps } from "../types.ts";

interface StageProps {
  readonly written: Written;
  readonly readOnly: boolean;
  readonly context: FormProps["context"];
}

/** A broader system, which of its goods the group is, and by which formula: nothing but the first until there is one. */
export function StageFields({ written, readOnly, context }: StageProps) {
  const within = written.text("within");
  const broader = namesOf(context, "system").filter((name) => name !== written.text("system"));
  if (broader.length === 0 && within === "") return null;
  const goods = Object.keys(dataBelow(context, within).goods ?? {});
  const choose = (name: string) => {
    if (name === "") return written.write([["within"], undefined], [["as"], undefined], [["unconditional"], undefined]);
    // Both systems meet at one point.
    written.write(
      [["groups"], undefined],
      [["over"], undefined],
      [["within"], name],
      [["as"], groupOf(context, written.text("system"), Object.keys(dataBelow(context, name).goods ?? {}))],
    );
  };
  return (
    <>
      <ChoiceField
        label="Within"
        value={within}
        choices={asChoices(broader)}
        none="no broader system"
        readOnly={readOnly}
        onChange={choose}
      />
      {within !== "" && (
        <>
          <ChoiceField
            label="As its good"
            value={written.text("as")}
            choices={asChoices(goods)}
            readOnly={readOnly}
            onChange={(value) => written.write([["as"], value])}
          />
          <RadioGroup
            legend="Unconditional by"
            value={written.text("unconditional") || "carpentier guyomard"}
            readOnly={readOnly}
            onChange={(value) =>
              written.write([["unconditional"], value === "carpentier guyomard" ? undefined : value])
            }
            choices={[
              { value: "carpentier guyomard", label: "Carpentier and Guyomard" },
              { value: "edgerton", label: "Edgerton, for groups whose goods rise alike" },
            ]}
          />
        </>
      )}
    </>
  );
}

/** The good a group most likely is: the one its system says it is conditional on, or the first. */
function groupOf({ cells }: StageProps["context"], system: string, goods: readonly string[]): string {
  const source = cells.find(({ kind, name }) => kind === "system" && name === system)?.source ?? "";
  const said = parseCell("system", source).written["conditional on"];
  return goods.find((good) => good === said) ?? goods[0] ?? "";
}
