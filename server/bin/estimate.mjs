// npm run --silent estimate -- study.yaml: installs what is missing, then estimates a study file without a server.
import { spawnSync } from "node:child_process";
import { join } from "node:path";
import { ROOT } from "./install.mjs";

const installer = `import { install } from ${JSON.stringify(new URL("./install.mjs", import.meta.url).href)}; install();`;
// Standard output is for findings only: what installing has to say goes to standard error.
const installed = run(["--input-type=module", "--eval", installer], ["ignore", 2, 2]);
process.exitCode =
  installed === 0
    ? run(["--import", "tsx", join(ROOT, "server", "bin", "estimate.ts"), ...process.argv.slice(2)], "inherit")
    : installed;

function run(words, stdio) {
  // npm changes to the project's folder and says in INIT_CWD where it was called from.
  const env = { ...process.env, TANGENCY_CALLED_FROM: process.env.INIT_CWD ?? process.cwd() };
  return spawnSync(process.execPath, words, { cwd: ROOT, stdio, env }).status ?? 1;
}
