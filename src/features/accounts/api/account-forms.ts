import { z } from "zod";
import { LONGEST_PASSPHRASE, SHORTEST_PASSPHRASE } from "../../../../shared/schemas/accounts.ts";

/** What the forms of this feature ask for, with their refusals. */
export const emailField = z.email("An e-mail address looks like name@place.example.").max(254);

export const passphraseField = z
  .string()
  .refine((text) => text.length >= SHORTEST_PASSPHRASE, {
    error: ({ input }) =>
      `The passphrase has ${String(input).length} characters and needs at least ${SHORTEST_PASSPHRASE}.`,
  })
  .max(LONGEST_PASSPHRASE, `The passphrase may have at most ${LONGEST_PASSPHRASE} characters.`);

export const knownPassphraseField = z.string().min(1, "The passphrase is missing.");

export const nameField = z
  .string()
  .trim()
  .min(1, "The name is missing: coauthors see it beside what you write.")
  .max(100, "A name has at most 100 characters.");
