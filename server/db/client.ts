import { mkdirSync } from "node:fs";
import { dirname } from "node:path";
import SqliteDatabase from "better-sqlite3";
import { type BetterSQLite3Database, drizzle } from "drizzle-orm/better-sqlite3";
import { migrateDatabase } from "./migrate.ts";
import * as schema from "./schema/index.ts";

export type Database = BetterSQLite3Database<typeof schema>;

export interface OpenDatabase {
  readonly db: Database;
  /** The driver underneath, for pragmas and backup. */
  readonly sqlite: SqliteDatabase.Database;
  readonly path: string;
  close(): void;
}

/**
 * Opens the file, checks that it is whole, and brings its tables up to date.
 * Throws when it is damaged, or was written by a newer version of the program.
 */
export function openDatabase(path: string): OpenDatabase {
  mkdirSync(dirname(path), { recursive: true });
  const open = connectDatabase(path);
  try {
    checkIntegrity(open.sqlite, path);
    migrateDatabase(open);
    return open;
  } catch (error) {
    open.close();
    throw error;
  }
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
  } catch (error) {
    sqlite.close();
    throw isNotADatabase(error)
      ? new Error(`${path} is not a database: it is damaged, or another kind of file.`)
      : error;
  }
  return { db: drizzle(sqlite, { schema }), sqlite, path, close: () => void sqlite.close() };
}

function checkIntegrity(sqlite: SqliteDatabase.Database, path: string): void {
  const answers = sqlite.pragma("quick_check(3)") as { quick_check: string }[];
  const faults = answers.map((answer) => answer.quick_check).filter((answer) => answer !== "ok");
  if (faults.length > 0) throw new Error(`The database ${path} is damaged: ${faults.join("; ")}. Restore a backup.`);
}

function isNotADatabase(error: unknown): boolean {
  return error instanceof SqliteDatabase.SqliteError && /^SQLITE_(NOTADB|CORRUPT)/.test(error.code);
}
