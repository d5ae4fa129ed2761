import { TOTAL_EXPENDITURE } from "../../../shared/schemas/elasticities.ts";
import { FIGURE_ASKS, FIGURE_NAMES, type FigureName } from "../../../shared/schemas/figure.ts";
import type { Value } from "../../../shared/study/edit.ts";
import { CellField } from "../form/cell-field.tsx";
import { CheckGroup, RadioGroup } from "../form/choices.tsx";
import { asChoices, ChoiceField, Unreadable } from "../form/fields.tsx";
import { groupColumns } from "../form/group-columns.ts";
import { NumberField } from "../form/number-field.tsx";
import { PointField } from "../form/point-fields.tsx";
import { readWritten, type Written } from "../form/written.ts";
import type { FormProps } from "../types.ts";
import { dataOfFigure, isFigure, newFigure, shownBy } from "./question.ts";

/** How each figure is offered. */
const LABELS: Readonly<Record<FigureName, string>> = {
  "engel curves": "Engel curves: shares against expenditure",
  "demand curve": "demand for a good against its price",
  elasticities: "elasticities with intervals",
  "fit of shares": "observed shares against predicted ones",
  "largest eigenvalue": "the largest eigenvalue against expenditure",
  incidence: "who bears a price change",
  "shares by group": "observed shares by group of rows",
  "price distribution": "how the prices of a good are spread",
};

/** A figure cell as a form: what is shown, of which cell, for which goods, where. */
export function FigureForm(props: FormProps) {
  const { context, readOnly } = props;
  const written = readWritten("figure", props);
  if (!written.readable) return <Unreadable />;
  const show = shownBy(written);
  const own = { written, readOnly };
  return (
    <div>
      <RadioGroup
        legend="Shows"
        value={show ?? ""}
        readOnly={readOnly}
        onChange={(next) => isFigure(next) && written.write(...newFigure(next, written, context.cells))}
        choices={FIGURE_NAMES.map((name) => ({ value: name, label: LABELS[name] }))}
      />
      {show && <AskedFields show={show} {...own} context={context} />}
      {show !== "price distribution" && show !== "incidence" && (
        <NumberField label="Level of confidence" path={["level"]} {...own} otherwise="0.95" />
      )}
    </div>
  );
}

interface OwnProps {
  readonly written: Written;
  readonly readOnly: boolean;
}

function AskedFields({
  show,
  written,
  readOnly,
  context,
}: OwnProps & { show: FigureName } & Pick<FormProps, "context">) {
  const asks = FIGURE_ASKS[show];
  const data = dataOfFigure(written, asks.reads, context);
  const goods = Object.keys((data.goods as object | null | undefined) ?? {});
  const own = { written, readOnly };
  const groups = <GroupFields {...own} columns={groupColumns(context, data)} />;
  const point = <PointField {...own} context={context} otherwise="mean" />;
  return (
    <>
      <CellField kind={asks.reads} {...own} context={context} />
      {asks.goods === "one" && (
        <ChoiceField
          label="Good"
          value={written.list("goods")[0] ?? ""}
          choices={asChoices(goods)}
          readOnly={readOnly}
          onChange={(good) => written.write([["goods"], [good]])}
        />
      )}
      {asks.goods === "some" && <GoodsField {...own} goods={goods} />}
      {asks.at && asks.groups && (
        <RadioGroup
          legend="Of"
          value={written.value("groups") === undefined ? "point" : "groups"}
          readOnly={readOnly}
          onChange={(next) =>
            next === "groups"
              ? written.write([["at"], undefined], [["groups"], { of: TOTAL_EXPENDITURE, quantiles: 5 }])
              : written.write([["groups"], undefined], [["at"], "mean"])
          }
          choices={[
            { value: "point", label: "one point", below: point },
            { value: "groups", label: "groups of rows", below: groups },
          ]}
        />
      )}
      {asks.at && !asks.groups && point}
      {!asks.at && asks.groups && groups}
    </>
  );
}

/** All goods while none is chosen; the last one taken out leaves all of them. */
function GoodsField({ written, readOnly, goods }: OwnProps & { goods: readonly string[] }) {
  return (
    <>
      <CheckGroup
        legend="Goods"
        values={written.list("goods")}
        choices={asChoices(goods)}
        readOnly={readOnly}
        onChange={(values) => written.write([["goods"], values.length > 0 ? values : undefined])}
      />
      {written.list("goods").length === 0 && (
        <p className="type-small pb-1 text-ink2">All goods, while none is chosen.</p>
      )}
    </>
  );
}

function GroupFields({ written, readOnly, columns }: OwnProps & { columns: readonly string[] }) {
  return (
    <>
      <ChoiceField
        label="By"
        value={written.text("groups", "of")}
        choices={asChoices([TOTAL_EXPENDITURE, ...columns])}
        readOnly={readOnly}
        none={`${TOTAL_EXPENDITURE}, tenths`}
        onChange={(value) => written.write([["groups"], newGroups(value)])}
      />
      <NumberField label="Quantiles" path={["groups", "quantiles"]} written={written} readOnly={readOnly} />
      <p className="text-[0.78125rem]/[1.0625rem] text-ink2">
        Five for fifths of equal weight; empty for a group a value.
      </p>
    </>
  );
}

/** Expenditure has as many values as rows, so that its groups are quantiles. */
function newGroups(column: string): Value | undefined {
  if (column === "") return undefined;
  return column === TOTAL_EXPENDITURE ? { of: column, quantiles: 5 } : { of: column };
}
