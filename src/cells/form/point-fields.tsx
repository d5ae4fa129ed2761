import { parseCell } from "../../../shared/study/parse-cell.ts";
import type { FormProps } from "../types.ts";
import { RadioGroup } from "./choices.tsx";
import { TextField } from "./fields.tsx";
import { NumberField } from "./number-field.tsx";
import { newPoint, type PointChoice, pointChoice } from "./point-choice.ts";
import type { Written } from "./written.ts";

/** The data cell beneath a system, as its source is written. */
export function dataBelow({ cells }: FormProps["context"], systemName: string): Record<string, unknown> {
  const source = (kind: "system" | "data", name: unknown) => {
    const cell = cells.find((one) => one.kind === kind && one.name === name);
    return cell ? parseCell(kind, cell.source).written : {};
  };
  return source("data", source("system", systemName).data);
}

interface PointProps {
  readonly written: Written;
  readonly readOnly: boolean;
}

function PointFields({ choice, written, readOnly }: PointProps & { choice: PointChoice }) {
  if (choice === "quantile") {
    return (
      <TextField
        label="Quantile"
        value={written.text("at", "x").replace(/^quantile /, "")}
        numeric
        readOnly={readOnly}
        onCommit={(value) => written.write([["at", "x"], `quantile ${value}`])}
      />
    );
  }
  if (choice === "row") return <NumberField label="Row" path={["at", "row"]} {...{ written, readOnly }} required />;
  return (
    <>
      {Object.keys(written.map("at", "prices")).map((good) => (
        <NumberField
          key={good}
          label={`Price, ${good}`}
          path={["at", "prices", good]}
          written={written}
          readOnly={readOnly}
          required
        />
      ))}
      <NumberField label="Expenditure" path={["at", "x"]} written={written} readOnly={readOnly} required />
      <p className="text-[0.78125rem]/[1.0625rem] text-ink2">In the units uploaded.</p>
    </>
  );
}

/** Where a system is evaluated, `otherwise` where its key is not given. */
export function PointField({
  written,
  readOnly,
  context,
  otherwise,
}: PointProps & { context: FormProps["context"]; otherwise: PointChoice }) {
  const at = written.value("at");
  const choice = at === undefined ? otherwise : pointChoice(at);
  const fields = (of: PointChoice) => <PointFields choice={of} written={written} readOnly={readOnly} />;
  const goods = () => Object.keys(dataBelow(context, written.text("system")).goods ?? {});
  return (
    <RadioGroup
      legend="At"
      value={choice}
      readOnly={readOnly}
      onChange={(next) => written.write([["at"], newPoint(next as PointChoice, goods())])}
      choices={[
        { value: "base point", label: "the base point" },
        { value: "mean", label: "the sample mean" },
        { value: "quantile", label: "a quantile of expenditure", below: fields("quantile") },
        { value: "row", label: "a row of the data", below: fields("row") },
        { value: "own", label: "prices and expenditure of your own", below: fields("own") },
      ]}
    />
  );
}
