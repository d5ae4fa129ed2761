import { accessSync, constants, mkdirSync } from "node:fs";
import { join } from "node:path";
import SqliteDatabase from "better-sqlite3";

/**
 * One program at a time over one folder of data: two would each take the other's work for its own.
 * The lock is the operating system's, on a file held open, so that it goes with the process however that ends.
 */
export function lockFolder(dataFolder: string): () => void {
  makeWritable(dataFolder);
  const file = new SqliteDatabase(join(dataFolder, "in-use"), { timeout: 0 });
  try {
    file.exec("BEGIN EXCLUSIVE");
  } catch {
    file.close();
    throw new Error(
      `The data in ${dataFolder} are in use by another Tangency: stop that one, or set TANGENCY_DATA to another folder.`,
    );
  }
  return () => void file.close();
}

function makeWritable(dataFolder: string): void {
  try {
    mkdirSync(dataFolder, { recursive: true });
    accessSync(dataFolder, constants.R_OK | constants.W_OK | constants.X_OK);
  } catch (error) {
    throw new Error(
      `Data cannot be kept in ${dataFolder} (${(error as NodeJS.ErrnoException).code}): let this account write there, or set TANGENCY_DATA to another folder.`,
    );
  }
}
