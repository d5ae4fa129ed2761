import type { RevealedPreferenceFinding, TestsFinding } from "../schemas/tests.ts";
import { printCount, printPercent, printQuantity } from "./numbers.ts";
import { countedRows, listed } from "./phrases.ts";
import type { LabelledTable } from "./table.ts";

export function revealedOf({ revealed }: Pick<TestsFinding, "revealed">): RevealedPreferenceFinding | undefined {
  return revealed && !("absent" in revealed) ? revealed : undefined;
}

/** "The generalised axiom of revealed preference is violated by 12 of 338 rows; Afriat's efficiency index is 0.987." */
export function revealedSentence(revealed: RevealedPreferenceFinding): string {
  const { rows, pairs, rowsInvolved, index } = revealed;
  if (pairs === 0) {
    return `No choice among ${countedRows(rows)} contradicts another: some well-behaved utility explains them all, as far as prices crossed at all.`;
  }
  const efficiency = `Afriat’s efficiency index is ${printIndex(index)}`;
  return `The generalised axiom of revealed preference is violated: ${printCount(rowsInvolved)} of ${countedRows(rows)} contradict one another. ${efficiency}.`;
}

/** A share that is not one does not print as one. */
export function printIndex(index: number): string {
  const printed = printQuantity(index, "coefficient");
  return index < 1 && Number(printed) === 1 ? "above 0.9999" : index === 1 ? "1" : printed;
}

/** What the index means, and what the comparison takes for granted. */
export function revealedNotes({ pairs, index, periods, weighted, cycle, rows }: RevealedPreferenceFinding): string[] {
  const waste = `An outlay cut by ${printPercent(1 - index, 2)} in every comparison leaves no contradiction.`;
  const cross =
    "The rows are no sequence of one consumer’s choices, yet the axiom reads them so: contradictions here may be differences in taste.";
  const shown = cycle.map(printCount);
  return [
    ...(pairs > 0 && index < 1 ? [waste] : []),
    ...(pairs > 0 && index === 1
      ? ["The contradictions rest on exact equalities of cost: any cut of outlays resolves them, so the index is 1."]
      : []),
    ...(cycle.length > 0
      ? [
          `The first: ${cycle.length === 1 ? "row" : "rows"} ${listed(shown)}, each of which could afford the next, and the last the first.`,
        ]
      : []),
    ...(periods ? [] : [cross]),
    ...(weighted ? [`Every one of the ${countedRows(rows)} counts once: weights do not enter.`] : []),
  ];
}

export function revealedTable(revealed: RevealedPreferenceFinding): LabelledTable {
  const { rows, pairs, directPairs, rowsInvolved, index } = revealed;
  const count = (label: string, value: number) => ({
    label,
    cells: [{ kind: "number" as const, value, printed: printCount(value) }],
  });
  return {
    name: "revealed-preference",
    title: "Revealed preference",
    corner: "Generalised axiom",
    columns: [{ label: "Value" }],
    rows: [
      count("Rows compared", rows),
      count("Pairs that contradict", pairs),
      count("of them without a third row", directPairs),
      count("Rows in some pair", rowsInvolved),
      { label: "Afriat’s efficiency index", cells: [{ kind: "number", value: index, printed: printIndex(index) }] },
    ],
    notes: revealedNotes(revealed),
  };
}
