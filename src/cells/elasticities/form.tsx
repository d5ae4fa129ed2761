import { TOTAL_EXPENDITURE } from "../../../shared/schemas/elasticities.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { CellField } from "../form/cell-field.tsx";
import { RadioGroup } from "../form/choices.tsx";
import { asChoices, ChoiceField, Unreadable } from "../form/fields.tsx";
import { groupColumns } from "../form/group-columns.ts";
import { NumberField } from "../form/number-field.tsx";
import { dataBelow, PointField } from "../form/point-fields.tsx";
import { readWritten, type Written } from "../form/written.ts";
import type { FormProps } from "../types.ts";
import { isOf, newQuestion, questionOf } from "./question.ts";
import { StageFields } from "./stage-fields.tsx";

/** An elasticities cell as a form: which system, of whom, by which shares. */
export function ElasticitiesForm(props: FormProps) {
  const { context, readOnly } = props;
  const written = readWritten("elasticities", props);
  if (!written.readable) return <Unreadable />;
  const question = questionOf(written);
  const columns = groupColumns(context, dataBelow(context, written.text("system")));
  const own = { written, readOnly };
  return (
    <div>
      <CellField kind="system" {...own} context={context} />
      <RadioGroup
        legend="Of"
        value={question}
        readOnly={readOnly}
        onChange={(next) => isOf(next) && written.write(...newQuestion(next))}
        choices={[
          { value: "point", label: "one point", below: <PointField {...own} context={context} otherwise="mean" /> },
          { value: "groups", label: "groups of rows", below: <GroupFields {...own} columns={columns} /> },
          { value: "rows", label: "all rows together" },
        ]}
      />
      <RadioGroup
        legend="Shares in the formulas"
        value={written.text("shares") || "predicted"}
        readOnly={readOnly}
        onChange={(value) => written.write([["shares"], value === "predicted" ? undefined : value])}
        choices={[
          { value: "predicted", label: "predicted by the system" },
          { value: "observed", label: "observed means" },
        ]}
      />
      <IndexField {...own} context={context} />
      <StageFields {...own} context={context} />
      <NumberField label="Level of confidence" path={["level"]} {...own} otherwise="0.95" />
    </div>
  );
}

interface OwnProps {
  readonly written: Written;
  readonly readOnly: boolean;
}

function GroupFields({ written, readOnly, columns }: OwnProps & { columns: readonly string[] }) {
  return (
    <>
      <ChoiceField
        label="By"
        value={written.text("groups", "of")}
        choices={asChoices([TOTAL_EXPENDITURE, ...columns])}
        readOnly={readOnly}
        onChange={(value) => written.write([["groups", "of"], value])}
      />
      <NumberField label="Quantiles" path={["groups", "quantiles"]} written={written} readOnly={readOnly} />
      <p className="text-[0.78125rem]/[1.0625rem] text-ink2">
        Five for fifths of equal weight; empty for a group a value.
      </p>
      <RadioGroup
        legend="Evaluated"
        value={written.text("over") || "means"}
        readOnly={readOnly}
        onChange={(value) => written.write([["over"], value === "means" ? undefined : value])}
        choices={[
          { value: "means", label: "at each group’s mean point" },
          { value: "rows", label: "over the rows of each, by what they spend" },
        ]}
      />
    </>
  );
}

/** Only Stone's index has weights that can be let move. */
function IndexField({ written, readOnly, context }: OwnProps & Pick<FormProps, "context">) {
  const system = context.cells.find(({ kind, name }) => kind === "system" && name === written.text("system"));
  const isStone = system !== undefined && parseCell("system", system.source).written.index === "stone";
  const index = written.text("index");
  if (!isStone && index === "") return null;
  return (
    <RadioGroup
      legend="Weights of Stone’s index"
      value={index || "held"}
      readOnly={readOnly}
      onChange={(value) => written.write([["index"], value === "held" ? undefined : value])}
      choices={[
        { value: "held", label: "held, after Chalfant" },
        { value: "exact", label: "moving, after Green and Alston" },
      ]}
    />
  );
}
