import { spawnSync } from "node:child_process";
import { join } from "node:path";
import { ROOT } from "./install.mjs";

const installer = `import { install } from ${JSON.stringify(new URL("./install.mjs", import.meta.url).href)}; install();`;

/**
 * Installs what is missing, then runs a command of this folder from its source with the words it was called with. Standard
 * output is the command's alone: what installing has to say goes to standard error. Returns the exit code.
 */
export function runSource(name) {
  const installed = run(["--input-type=module", "--eval", installer], ["ignore", 2, 2]);
  if (installed !== 0) return installed;
  return run(["--import", "tsx", join(ROOT, "server", "bin", name), ...process.argv.slice(2)], "inherit");
}

function run(words, stdio) {
  // npm changes to the project's folder and says in INIT_CWD where it was called from.
  const env = { ...process.env, TANGENCY_CALLED_FROM: process.env.INIT_CWD ?? process.cwd() };
  return spawnSync(process.execPath, words, { cwd: ROOT, stdio, env }).status ?? 1;
}
