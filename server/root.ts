import { existsSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { z } from "zod";

/** The top of the project, seen from the sources as from the compiled tree. */
export const ROOT = findRoot();

/** The program's own version. */
export const VERSION = z
  .object({ version: z.string() })
  .parse(JSON.parse(readFileSync(join(ROOT, "package.json"), "utf8"))).version;

function findRoot(): string {
  let folder = dirname(fileURLToPath(import.meta.url));
  while (!existsSync(join(folder, "package.json"))) {
    const above = dirname(folder);
    if (above === folder) throw new Error("package.json is missing above the program.");
    folder = above;
  }
  return folder;
}
