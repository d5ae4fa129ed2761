import { mkdirSync } from "node:fs";
import { dirname } from "node:path";
import type SqliteDatabase from "better-sqlite3";
import { connectDatabase, type Database, type OpenDatabase } from "./connection.ts";
import { migrateDatabase } from "./migrate.ts";

export { connectDatabase, type Database, type OpenDatabase };

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

function checkIntegrity(sqlite: SqliteDatabase.Database, path: string): void {
  const answers = sqlite.pragma("quick_check(3)") as { quick_check: string }[];
  const faults = answers.map((answer) => answer.quick_check).filter((answer) => answer !== "ok");
  if (faults.length > 0) throw new Error(`The database ${path} is damaged: ${faults.join("; ")}. Restore a backup.`);
}
