import { TextField } from "./fields.tsx";
import type { KeyPath, Written } from "./written.ts";

/**
 * A number where one was typed, with the minus sign of tables or of keyboards; anything else is written as it is,
 * for the text to mark.
 */
export function asNumber(text: string): number | string {
  const number = Number(text.replace("−", "-"));
  return text !== "" && Number.isFinite(number) ? number : text;
}

interface NumberProps {
  readonly label: string;
  /** The key it writes. */
  readonly path: KeyPath;
  readonly written: Written;
  readonly readOnly: boolean;
  /** What stands there while the key is absent. */
  readonly otherwise?: string;
  /** The key stays when its field is emptied, for the text to mark; without it the key goes. */
  readonly required?: boolean;
}

/** A number under a key of the source. */
export function NumberField({ label, path, written, readOnly, otherwise = "", required = false }: NumberProps) {
  return (
    <TextField
      label={label}
      value={written.text(...path) || otherwise}
      numeric
      readOnly={readOnly}
      onCommit={(value) => written.write([path, value === "" && !required ? undefined : asNumber(value)])}
    />
  );
}
