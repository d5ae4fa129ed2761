import { existsSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { migrate } from "drizzle-orm/better-sqlite3/migrator";
import { z } from "zod";
import type { OpenDatabase } from "./connection.ts";

const journal = z.object({ entries: z.array(z.object({ when: z.number(), tag: z.string() })) });

/**
 * Brings the tables to this program's version, in one transaction. The version of a database is
 * the number of its last migration.
 */
export function migrateDatabase({ db, sqlite, path }: Pick<OpenDatabase, "db" | "sqlite" | "path">): void {
  const folder = migrationsFolder();
  const known = journal.parse(JSON.parse(readFileSync(join(folder, "meta", "_journal.json"), "utf8"))).entries.length;
  const found = Number(sqlite.pragma("user_version", { simple: true }));
  if (found > known) {
    throw new Error(
      `The database ${path} is at version ${found}, and this program knows versions up to ${known}: start a newer program, or restore an older backup.`,
    );
  }
  // A table rebuilt with foreign keys on drops its children's rows, and inside the migrator's
  // transaction the pragma does nothing: so off before, on after, and checked.
  sqlite.pragma("foreign_keys = OFF");
  try {
    migrate(db, { migrationsFolder: folder });
    sqlite.pragma(`user_version = ${known}`);
  } finally {
    sqlite.pragma("foreign_keys = ON");
  }
  const orphans = sqlite.pragma("foreign_key_check") as { table: string; parent: string }[];
  if (orphans.length > 0) {
    const first = orphans[0];
    throw new Error(
      `The database ${path} has ${orphans.length} rows without what they refer to; the first is in ${first.table}, which refers to ${first.parent}. Restore a backup.`,
    );
  }
}

/** `drizzle/` at the top of the project, seen from the source as from the compiled tree. */
function migrationsFolder(): string {
  let folder = dirname(fileURLToPath(import.meta.url));
  while (!existsSync(join(folder, "drizzle", "meta", "_journal.json"))) {
    const above = dirname(folder);
    if (above === folder) throw new Error("The folder drizzle/ with the migrations is missing beside the program.");
    folder = above;
  }
  return join(folder, "drizzle");
}
