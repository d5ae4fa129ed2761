import { Refusal } from "../refusal.ts";
import type { ColumnBuilder } from "./column-builder.ts";

/**
 * Whether the file writes its decimals with a comma, judged over all its columns of numbers.
 *
 * Only files separated by semicolons or tabs come here with comma cells. The comma is certain once a cell has
 * it where thousands could not be set apart ("12,5", "0,914"); a file in which every comma is followed by
 * exactly three digits does not say, so such columns stay text and are refused by name where they are used.
 */
export function decideDecimalMark(builders: readonly ColumnBuilder[]): {
  decimalComma: boolean;
  asText: ReadonlySet<ColumnBuilder>;
} {
  const numeric = builders.filter((builder) => !builder.isText);
  const withComma = numeric.filter((builder) => builder.first.has("comma"));
  const withDot = numeric.filter((builder) => builder.first.has("dot"));
  const certain = withComma.find((builder) => builder.certainlyDecimal);
  if (certain === undefined) return { decimalComma: false, asText: new Set(withComma) };
  if (withDot.length === 0) return { decimalComma: true, asText: new Set() };
  const dotted = withDot[0];
  throw new Refusal([
    {
      sentence: `The file writes decimals in two ways: ${certain.printFirst("comma")}, and ${dotted.printFirst("dot")}. Write all of them with a comma or all with a point.`,
      row: dotted.first.get("dot")?.row,
      column: dotted.name,
    },
  ]);
}
