import { setKey } from "../../../shared/study/edit.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";

/** The source with one more condition on the rows a data cell keeps. */
export function keepOnly(source: string, condition: string): string {
  const { keep } = parseCell("data", source).written;
  const before = typeof keep === "string" ? keep.trim() : keep === undefined || keep === null ? "" : String(keep);
  // What holds by "or" is set apart, as "and" binds first.
  const set = (expression: string) => (/\bor\b|\?/.test(expression) ? `(${expression})` : expression);
  return setKey(source, ["keep"], before === "" ? condition : `${set(before)} and ${set(condition)}`);
}
