// Installs what is missing. Plain Node: when this runs, nothing may be installed yet.
import { spawnSync } from "node:child_process";
import { existsSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";

export const ROOT = join(dirname(fileURLToPath(import.meta.url)), "..", "..");
const OLDEST_NODE = [20, 19];

/** Ends the process with a sentence when Node is too old or the packages cannot be installed. */
export function install() {
  const [major, minor] = process.versions.node.split(".").map(Number);
  if (major < OLDEST_NODE[0] || (major === OLDEST_NODE[0] && minor < OLDEST_NODE[1])) {
    fail(`Tangency needs Node.js ${OLDEST_NODE.join(".")} or newer, and this is ${process.versions.node}.`);
  }
  const missing = firstDifference();
  if (missing === undefined) return;
  console.log(`Installing packages (${missing}); this takes a minute or two the first time.`);
  const { status } = npm(["ci", "--include=dev", "--no-audit", "--no-fund"]);
  if (status !== 0) fail("The packages could not be installed: npm ci failed, and says why above.");
}

/** What the lock file wants and node_modules has not, in words; undefined when they agree. */
function firstDifference() {
  const installed = join(ROOT, "node_modules", ".package-lock.json");
  if (!existsSync(installed)) return "none are installed";
  const have = packagesOf(installed);
  for (const [path, wanted] of Object.entries(packagesOf(join(ROOT, "package-lock.json")))) {
    const found = have[path];
    // Packages of other platforms are left out on purpose.
    if (path === "" || (found === undefined && wanted.optional)) continue;
    if (found === undefined) return `${path} is missing`;
    if (found.version !== wanted.version) return `${path} is ${found.version} and should be ${wanted.version}`;
  }
  return undefined;
}

function packagesOf(path) {
  return JSON.parse(readFileSync(path, "utf8")).packages;
}

function npm(words) {
  const options = { cwd: ROOT, stdio: "inherit" };
  const own = process.env.npm_execpath;
  if (own?.endsWith(".js")) return spawnSync(process.execPath, [own, ...words], options);
  return spawnSync("npm", words, { ...options, shell: process.platform === "win32" });
}

/** Runs a program of an installed package; resolves to its exit code. */
export function runPackage(script, words, options = {}) {
  const { status } = spawnSync(process.execPath, [join(ROOT, "node_modules", script), ...words], {
    cwd: ROOT,
    stdio: "inherit",
    ...options,
  });
  return status ?? 1;
}

export function fail(sentence) {
  console.error(sentence);
  process.exit(1);
}

export function runDirectly(url) {
  return process.argv[1] !== undefined && fileURLToPath(url) === process.argv[1];
}
