import type { DataSpecification } from "../../schemas/data.ts";
import type { SystemFinding, SystemSpecification } from "../../schemas/system.ts";
import type { UnconditionalFormula } from "../../schemas/two-stage.ts";
import { cited } from "../cite.ts";
import { printCount } from "../numbers.ts";
import type { ReferenceKey } from "../references.ts";

/** What a methods paragraph is drafted from: the question, and as far as there is one, its answer. */
export interface MethodsParts {
  readonly specification: SystemSpecification;
  /** The data cell it reads; absent while that has problems. */
  readonly data?: DataSpecification;
  /** Only of this very specification: nothing is said that it does not hold. */
  readonly finding?: SystemFinding;
  /** Formulas by which elasticities cells take the system's to unconditional ones, each once. */
  readonly unconditional?: readonly UnconditionalFormula[];
}

/** A sentence, and the works it cites. */
export interface Said {
  readonly sentence: string;
  readonly cites: readonly ReferenceKey[];
}

export const said = (sentence: string, cites: readonly ReferenceKey[] = []): Said => ({ sentence, cites });

/** "(Stone 1954)", "(Theil 1965; Barten 1966)". */
export function citing(...keys: readonly ReferenceKey[]): string {
  return `(${keys.map(cited).join("; ")})`;
}

const WORDS = ["no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve"];

/** Small counts in words, as prose has them. */
export const inWords = (count: number): string => WORDS[count] ?? printCount(count);

/** "six groups of goods". */
export const countedIn = (count: number, one: string, many = `${one}s`): string =>
  `${inWords(count)} ${count === 1 ? one : many}`;
