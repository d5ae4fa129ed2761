import { capital } from "../../../shared/study/words.ts";
import type { FormProps } from "../types.ts";
import { asChoices, ChoiceField } from "./fields.tsx";
import type { Written } from "./written.ts";

interface CellFieldProps {
  /** What is read, and the key that names it. */
  readonly kind: "data" | "system" | "price change";
  readonly written: Written;
  readonly readOnly: boolean;
  readonly context: FormProps["context"];
}

/** The names of the study's cells of a kind, in their order. */
export const namesOf = ({ cells }: FormProps["context"], kind: CellFieldProps["kind"]) =>
  cells.filter((cell) => cell.kind === kind).map(({ name }) => name);

/** The cell that this one reads. */
export function CellField({ kind, written, readOnly, context }: CellFieldProps) {
  return (
    <ChoiceField
      label={capital(kind)}
      value={written.text(kind)}
      choices={asChoices(namesOf(context, kind))}
      readOnly={readOnly}
      onChange={(value) => written.write([[kind], value])}
    />
  );
}
