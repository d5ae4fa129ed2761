import { bibtex, referenceInWords, sortedReferences } from "../cite.ts";
import type { ReferenceKey } from "../references.ts";
import { estimationSentences } from "./estimation.ts";
import type { MethodsParts } from "./parts.ts";
import { restrictionSentences } from "./restrictions.ts";
import { standardErrorSentences } from "./standard-errors.ts";
import { systemSentences } from "./system.ts";
import { twoStageSentences } from "./two-stage.ts";

/** A system's methods as a paper would say them, with the works they rest on. */
export interface MethodsParagraph {
  readonly text: string;
  /** By first author and year. */
  readonly references: readonly ReferenceKey[];
}

/**
 * The methods paragraph of a system: what is estimated, which theory is imposed and what the tests of it say, how
 * goods not bought and an endogenous total are met, estimator, sample and standard errors. Without a finding it says
 * what the specification asks and no number; with one, only numbers that the finding holds.
 */
export function methodsParagraph(parts: MethodsParts): MethodsParagraph {
  const all = [
    ...systemSentences(parts),
    ...restrictionSentences(parts),
    ...estimationSentences(parts),
    ...standardErrorSentences(parts),
    ...twoStageSentences(parts),
  ];
  return {
    text: all.map(({ sentence }) => sentence).join(" "),
    references: sortedReferences(all.flatMap(({ cites }) => cites)),
  };
}

/** The paragraph with its references below it, as plain text. */
export function paragraphWithReferences({ text, references }: MethodsParagraph): string {
  return `${text}\n\nReferences\n\n${references.map(referenceInWords).join("\n")}\n`;
}

/** The references alone, for a bibliography file. */
export function paragraphBibtex({ references }: MethodsParagraph): string {
  return bibtex(references);
}
