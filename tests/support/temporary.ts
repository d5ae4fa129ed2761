import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";

/** A folder of the test's own, to be removed at its end. */
export function temporaryFolder() {
  const path = mkdtempSync(join(tmpdir(), "tangency-test-"));
  return { path, remove: () => rmSync(path, { recursive: true, force: true }) };
}
