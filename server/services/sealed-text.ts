import type { Finding } from "../../shared/schemas/cell.ts";
import type { SealedText } from "../../shared/schemas/text.ts";
import { askedNumbers } from "../../shared/study/asked-numbers.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import { sealedText, textFinding } from "../../shared/tables/text-finding.ts";
import { conflict, ServiceError } from "../errors.ts";
import { refuseOneHousehold } from "./one-household.ts";

/** A cell that a text quotes, with what it found. */
interface Quoted {
  readonly cell: CellSource;
  readonly finding: Finding;
  readonly fingerprint: string;
}

/**
 * A text with its numbers as they are now, which is how they stay. Throws 409 when one of them is not there, and when
 * it is of a finding that would itself not be sealed: what shows a single household is not shown by quoting it.
 */
export function sealText({ name, source }: CellSource, quoted: ReadonlyMap<string, Quoted>): SealedText {
  for (const one of quoted.values()) refuseToQuote(name, one);
  const finding = textFinding(
    source,
    askedNumbers(source, (cell) => quoted.get(cell)?.finding.kind),
    (cell) => {
      const one = quoted.get(cell);
      if (one === undefined) return { standing: "absent", because: `${cell} has no numbers to quote.` };
      return { standing: "current", finding: one.finding, fingerprint: one.fingerprint };
    },
  );
  const sealed = sealedText(finding);
  if (!("refused" in sealed)) return sealed;
  throw conflict(`In ${name} ${sealed.refused}. Only a text whose every number is current is sealed.`);
}

function refuseToQuote(text: string, { cell, finding }: Quoted): void {
  try {
    refuseOneHousehold({ cell, finding });
  } catch (error) {
    throw error instanceof ServiceError ? conflict(`${text} quotes ${cell.name}. ${error.message}`) : error;
  }
}
