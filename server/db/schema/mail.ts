import { index, integer, sqliteTable, text } from "drizzle-orm/sqlite-core";

/**
 * Messages on their way, and those that the local post box keeps. The words are sealed under the installation's
 * secret, since links stand in them, and are gone once a mail server has taken them.
 */
export const mails = sqliteTable(
  "mails",
  {
    id: text("id").primaryKey(),
    recipient: text("recipient").notNull(),
    subject: text("subject").notNull(),
    /** Sealed; null once sent or given up. */
    words: text("words"),
    /** "kept" is what the local post box has. */
    state: text("state", { enum: ["waiting", "sent", "kept", "given up"] }).notNull(),
    writtenAt: integer("written_at", { mode: "timestamp_ms" }).notNull(),
    attempts: integer("attempts").notNull().default(0),
    /** When it is tried next; of a message that waits. */
    nextAt: integer("next_at", { mode: "timestamp_ms" }),
    settledAt: integer("settled_at", { mode: "timestamp_ms" }),
    /** What the mail server said last when it would not take it. */
    fault: text("fault"),
  },
  (table) => [index("mails_next").on(table.state, table.nextAt), index("mails_written").on(table.writtenAt)],
);
