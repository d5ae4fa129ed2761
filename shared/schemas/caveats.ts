import { z } from "zod";

/** What a finding that rests on a system takes over from how the system was estimated, for every reader of it to see. */
export const CAVEATS = [
  /** Two steps for goods not bought: shares are those of the latent system. */
  "latent shares",
  /** Standard errors take the probits of those two steps as data. */
  "first step as given",
  /** The system's total is what is spent on one group of goods. */
  "conditional on a group",
  /** Standard errors take the residual of an endogenous total's first stage as data. */
  "first stage as given",
] as const;

export const caveats = z.array(z.enum(CAVEATS)).min(1).optional();
export type Caveats = z.infer<typeof caveats>;
