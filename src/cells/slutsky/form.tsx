import { parseCell } from "../../../shared/study/parse-cell.ts";
import { RadioGroup } from "../form/choices.tsx";
import { asChoices, ChoiceField, TextField, Unreadable } from "../form/fields.tsx";
import { readWritten, type Written } from "../form/written.ts";
import type { FormProps } from "../types.ts";
import { newPoint, type PointChoice, pointChoice } from "./point-choice.ts";

/** The goods of the system a matrix reads, found through the sources. */
function goodsOf({ cells }: FormProps["context"], systemName: string): string[] {
  const source = (kind: "system" | "data", name: unknown) => {
    const cell = cells.find((one) => one.kind === kind && one.name === name);
    return cell ? parseCell(kind, cell.source).written : {};
  };
  const data = source("data", source("system", systemName).data);
  return Object.keys(data.goods ?? {});
}

const asNumber = (text: string): number | string => {
  const number = Number(text);
  return text !== "" && Number.isFinite(number) ? number : text;
};

function PointFields({ choice, written, readOnly }: { choice: PointChoice; written: Written; readOnly: boolean }) {
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
  if (choice === "row") {
    return (
      <TextField
        label="Row"
        value={written.text("at", "row")}
        numeric
        readOnly={readOnly}
        onCommit={(value) => written.write([["at", "row"], asNumber(value)])}
      />
    );
  }
  return (
    <>
      {Object.keys(written.map("at", "prices")).map((good) => (
        <TextField
          key={good}
          label={`Price, ${good}`}
          value={written.text("at", "prices", good)}
          numeric
          readOnly={readOnly}
          onCommit={(value) => written.write([["at", "prices", good], asNumber(value)])}
        />
      ))}
      <TextField
        label="Expenditure"
        value={written.text("at", "x")}
        numeric
        readOnly={readOnly}
        onCommit={(value) => written.write([["at", "x"], asNumber(value)])}
      />
      <p className="text-[0.78125rem]/[1.0625rem] text-ink2">In the units uploaded.</p>
    </>
  );
}

/** A slutsky cell as a form: which system, at which point, in which form. */
export function SlutskyForm(props: FormProps) {
  const { context, readOnly } = props;
  const written = readWritten("slutsky", props);
  if (!written.readable) return <Unreadable />;
  const systems = context.cells.filter((cell) => cell.kind === "system").map((cell) => cell.name);
  const choice = pointChoice(written.value("at"));
  const fields = (of: PointChoice) => <PointFields choice={of} written={written} readOnly={readOnly} />;
  const choose = (next: string) =>
    written.write([["at"], newPoint(next as PointChoice, goodsOf(context, written.text("system")))]);
  return (
    <div>
      <ChoiceField
        label="System"
        value={written.text("system")}
        choices={asChoices(systems)}
        readOnly={readOnly}
        onChange={(value) => written.write([["system"], value])}
      />
      <RadioGroup
        legend="At"
        value={choice}
        readOnly={readOnly}
        onChange={choose}
        choices={[
          { value: "base point", label: "the base point" },
          { value: "mean", label: "the sample mean" },
          { value: "quantile", label: "a quantile of expenditure", below: fields("quantile") },
          { value: "row", label: "a row of the data", below: fields("row") },
          { value: "own", label: "prices and expenditure of your own", below: fields("own") },
        ]}
      />
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
