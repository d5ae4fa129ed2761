import SqliteDatabase from "better-sqlite3";
import { type BetterSQLite3Database, drizzle } from "drizzle-orm/better-sqlite3";
import * as schema from "./schema/index.ts";

export type Database = BetterSQLite3Database<typeof schema>;

export interface OpenDatabase {
  readonly db: Database;
  /** The driver underneath, for pragmas and backup. */
  readonly sqlite: SqliteDatabase.Database;
  readonly path: string;
  close(): void;
}

/** A further connection to a database that is already open and up to date, for instance in a worker. */
export function connectDatabase(path: string): OpenDatabase {
  const sqlite = new SqliteDatabase(path);
  try {
    sqlite.pragma("busy_timeout = 5000");
    sqlite.pragma("journal_mode = WAL");
    // An acknowledged edit survives a crash of the program under NORMAL, and of the machine under FULL.
    sqlite.pragma("synchronous = FULL");
    sqlite.pragma("foreign_keys = ON");
    // Households' data that someone removed leave the file, not only its index.
    sqlite.pragma("secure_delete = ON");
  } catch (error) {
    sqlite.close();
    throw isNotADatabase(error)
      ? new Error(`${path} is not a database: it is damaged, or another kind of file.`)
      : error;
  }
  return { db: drizzle(sqlite, { schema }), sqlite, path, close: () => void sqlite.close() };
}

function isNotADatabase(error: unknown): boolean {
  return error instanceof SqliteDatabase.SqliteError && /^SQLITE_(NOTADB|CORRUPT)/.test(error.code);
}
