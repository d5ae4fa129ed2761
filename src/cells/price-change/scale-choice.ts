import type { Value } from "../../../shared/study/edit.ts";
import type { Choice } from "../form/fields.tsx";

const ROOT = "square root of ";

/** How needs are counted, as one word to choose: a column, or the square root of one; empty where they are not. */
export function scaleChoice(written: unknown): string {
  if (typeof written === "string") return written;
  const isRoot = typeof written === "object" && written !== null && "square root of" in written;
  return isRoot ? `${ROOT}${written["square root of"]}` : "";
}

/** What the key is written as, once chosen; nothing takes it away. */
export function newScale(choice: string): Value | undefined {
  if (choice === "") return undefined;
  return choice.startsWith(ROOT) ? { "square root of": choice.slice(ROOT.length) } : choice;
}

/** Every column as it is declared, then the square root of each. */
export function scaleChoices(columns: readonly string[]): Choice[] {
  return [
    ...columns.map((column) => ({ value: column, label: `${column}, as it stands` })),
    ...columns.map((column) => ({ value: `${ROOT}${column}`, label: `${ROOT}${column}` })),
  ];
}
