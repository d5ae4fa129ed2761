import { type Choice, ChoiceField } from "./fields.tsx";
import type { KeyPath, Written } from "./written.ts";

interface DefaultProps {
  readonly label: string;
  /** The key it writes. */
  readonly path: KeyPath;
  /** The choice that the key stands at while it is absent: choosing it takes the key away. */
  readonly otherwise: string;
  readonly choices: readonly Choice[];
  readonly written: Written;
  readonly readOnly: boolean;
}

/** One of several words under a key that may be left out. */
export function DefaultField({ label, path, otherwise, choices, written, readOnly }: DefaultProps) {
  return (
    <ChoiceField
      label={label}
      value={written.text(...path) || otherwise}
      choices={choices}
      readOnly={readOnly}
      onChange={(value) => written.write([path, value === otherwise ? undefined : value])}
    />
  );
}
