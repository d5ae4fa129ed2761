import type { Problem } from "../../../shared/schemas/problem.ts";
import { Refusal } from "../refusal.ts";
import { quoteCell } from "./cell-text.ts";

const MOST_COLUMNS = 2000;
/** As long as a specification may write one. */
const LONGEST_NAME = 200;

/** The names of the columns, or everything that is wrong with them. */
export function readHeader(cells: readonly string[]): string[] {
  const names = cells.map((cell) => cell.trim());
  if (names.length > MOST_COLUMNS) {
    throw new Refusal(`The header has ${names.length} columns; at most ${MOST_COLUMNS} are read.`);
  }
  const problems: Problem[] = [];
  const position = new Map<string, number>();
  names.forEach((name, at) => {
    const earlier = position.get(name);
    if (name === "") {
      problems.push({ sentence: `Column ${at + 1} of ${names.length} has no name in the header.` });
    } else if (name.length > LONGEST_NAME) {
      problems.push({
        sentence: `Column ${at + 1} has a name of ${name.length} characters, ${quoteCell(name)}; at most ${LONGEST_NAME} are allowed.`,
      });
    } else if (earlier !== undefined) {
      problems.push({
        sentence: `Columns ${earlier + 1} and ${at + 1} of the header are both named ${name}.`,
        column: name,
      });
    } else position.set(name, at);
  });
  if (problems.length > 0) throw new Refusal(problems);
  return names;
}
