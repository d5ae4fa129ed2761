import type { Mailer } from "./mailer.ts";

/**
 * The local stand-in for a mail service, for the demo, for development and until a mail server is set: nothing leaves
 * the installation. Messages stay in the database, and administrators read them on a page of their own.
 */
export const localPostBox: Mailer = { kind: "post box", deliver: async () => {} };
