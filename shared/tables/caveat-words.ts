import type { Caveats } from "../schemas/caveats.ts";

const WORDS: Readonly<Record<NonNullable<Caveats>[number], string>> = {
  "latent shares":
    "Goods not bought take two steps: what stands here is of the latent shares, not of what is expected to be bought.",
  "first step as given": "The standard errors take the probits of the first step as data.",
  "conditional on a group":
    "The system is of one group of goods: what stands here is conditional on what is spent on the group.",
  "first stage as given": "The standard errors take the first stage of total expenditure as data.",
};

interface Cautioned {
  readonly caveats?: Caveats;
  readonly conditionalOn?: string;
}

/** What a reader has to know of the system beneath, a sentence each; of one group only where that is not said by its name. */
export function caveatSentences({ caveats = [], conditionalOn }: Cautioned): string[] {
  const untold = caveats.filter((caveat) => caveat !== "conditional on a group" || conditionalOn === undefined);
  return untold.map((caveat) => WORDS[caveat]);
}
