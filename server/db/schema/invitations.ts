import { index, integer, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { user } from "./auth.ts";
import { studies } from "./studies.ts";

/** Invitations by mail that nobody has answered yet: one row an address and study, gone once answered or withdrawn. */
export const invitations = sqliteTable(
  "invitations",
  {
    id: text("id").primaryKey(),
    studyId: text("study_id")
      .notNull()
      .references(() => studies.id, { onDelete: "cascade" }),
    /** In small letters. */
    email: text("email").notNull(),
    role: text("role", { enum: ["owner", "coauthor", "reader"] }).notNull(),
    /** SHA-256 of the link's token. */
    tokenHash: text("token_hash").notNull().unique(),
    invitedBy: text("invited_by").notNull(),
    invitedAt: integer("invited_at", { mode: "timestamp_ms" }).notNull(),
    expiresAt: integer("expires_at", { mode: "timestamp_ms" }).notNull(),
  },
  (table) => [index("invitations_study").on(table.studyId), index("invitations_email").on(table.email)],
);

/** Links sent to an address to show that it is its reader's: to make an account, or to move one to it. */
export const addressLinks = sqliteTable(
  "address_links",
  {
    /** SHA-256 of the link's token. */
    tokenHash: text("token_hash").primaryKey(),
    email: text("email").notNull(),
    /** The account that moves to the address; null where one is to be made. */
    userId: text("user_id").references(() => user.id, { onDelete: "cascade" }),
    expiresAt: integer("expires_at", { mode: "timestamp_ms" }).notNull(),
  },
  (table) => [index("address_links_email").on(table.email)],
);
