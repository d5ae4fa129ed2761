import type { Finding } from "../../../shared/schemas/cell.ts";
import type { TextFinding, TextSpecification } from "../../../shared/schemas/text.ts";
import { askedNumbers } from "../../../shared/study/asked-numbers.ts";
import { textFinding } from "../../../shared/tables/text-finding.ts";
import { Refusal } from "../refusal.ts";

/** What a quoted cell found, and under which fingerprint. */
export interface FoundCell {
  readonly finding: Finding;
  readonly fingerprint?: string;
}

/**
 * A text cell: its text with every quoted number, from findings that are all current. There is nothing to compute, so
 * that the workspace does the same in the browser as someone writes; here it is done for the command line.
 * Errors: `Refusal` (a finding holds no such number).
 */
export function runText({ text }: TextSpecification, cells: ReadonlyMap<string, FoundCell>): TextFinding {
  const found = textFinding(
    text,
    askedNumbers(text, (name) => cells.get(name)?.finding.kind),
    (name) => {
      const cell = cells.get(name);
      return cell ? { standing: "current", ...cell } : { standing: "absent", because: `No cell is called ${name}.` };
    },
  );
  const absent = found.quotations.filter(({ standing }) => standing === "absent");
  if (absent.length === 0) return found;
  throw new Refusal(
    absent.map(({ cell, words, because = "" }) => ({
      sentence: `{${cell}: ${words.join(", ")}} has no number. ${because}`,
      key: ["text"],
    })),
  );
}
