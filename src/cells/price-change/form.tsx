import { TOTAL_EXPENDITURE } from "../../../shared/schemas/elasticities.ts";
import { EXPENDITURE_PER_ADULT } from "../../../shared/schemas/price-change.ts";
import { CellField } from "../form/cell-field.tsx";
import { asChoices, ChoiceField, Unreadable } from "../form/fields.tsx";
import { groupColumns } from "../form/group-columns.ts";
import { NumberField } from "../form/number-field.tsx";
import { dataBelow, PointField } from "../form/point-fields.tsx";
import { readWritten, type Written } from "../form/written.ts";
import type { FormProps } from "../types.ts";
import { PriceFields } from "./price-fields.tsx";
import { newScale, scaleChoice, scaleChoices } from "./scale-choice.ts";

/** A price change cell as a form: which system and point, what becomes of each price, who is told apart. */
export function PriceChangeForm(props: FormProps) {
  const { context, readOnly } = props;
  const written = readWritten("price change", props);
  if (!written.readable) return <Unreadable />;
  const data = dataBelow(context, written.text("system"));
  const own = { written, readOnly };
  return (
    <div>
      <CellField kind="system" {...own} context={context} />
      <PointField {...own} context={context} otherwise="mean" />
      <PriceFields {...own} goods={Object.keys(data.goods ?? {})} />
      <NumberField label="Expenditure, per cent" path={["expenditure"]} {...own} otherwise="0" />
      <GroupFields {...own} columns={groupColumns(context, data)} />
      <NumberField label="Level of confidence" path={["level"]} {...own} otherwise="0.95" />
    </div>
  );
}

interface GroupProps {
  readonly written: Written;
  readonly readOnly: boolean;
  readonly columns: readonly string[];
}

/** Whom the answer is counted for apart, and what a household's needs are counted by. */
function GroupFields({ written, readOnly, columns }: GroupProps) {
  const of = written.text("groups", "of");
  return (
    <fieldset className="py-1.5">
      <legend className="mb-1 text-[0.875rem]/[1.25rem] text-ink2">Who bears it</legend>
      <ChoiceField
        label="Groups by"
        value={of}
        none="all rows together"
        choices={asChoices([EXPENDITURE_PER_ADULT, TOTAL_EXPENDITURE, ...columns])}
        readOnly={readOnly}
        onChange={(value) => {
          if (value === "") return written.write([["groups"], undefined]);
          const isMoney = value === EXPENDITURE_PER_ADULT || value === TOTAL_EXPENDITURE;
          const quantiles = isMoney && written.text("groups", "quantiles") === "" ? { quantiles: 5 } : undefined;
          if (of === "") return written.write([["groups"], { of: value, ...quantiles }]);
          written.write([["groups", "of"], value], ...(quantiles ? [[["groups", "quantiles"], 5] as const] : []));
        }}
      />
      {of !== "" && (
        <>
          <NumberField label="Quantiles" path={["groups", "quantiles"]} written={written} readOnly={readOnly} />
          <p className="text-[0.78125rem]/[1.0625rem] text-ink2">
            Five for fifths of equal weight; empty for a group a value.
          </p>
        </>
      )}
      <ChoiceField
        label="Equivalent adults"
        value={scaleChoice(written.value("equivalence scale"))}
        none="not counted"
        choices={scaleChoices(columns)}
        readOnly={readOnly}
        onChange={(value) => written.write([["equivalence scale"], newScale(value)])}
      />
    </fieldset>
  );
}
