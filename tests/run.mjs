// npm test: installs what is missing, the browser included, builds, and runs every test.
// Words after -- go to vitest; with VITEST_RESULTS set, the results are also written there as JSON.
import { spawnSync } from "node:child_process";
import { existsSync } from "node:fs";
import { delimiter, join } from "node:path";
import { build } from "../server/bin/build.mjs";
import { install, ROOT, runPackage } from "../server/bin/install.mjs";

/** The same engine without windows of its own to draw: the tests take three quarters of the time with it. */
const SHELL = "chromium-headless-shell";
const NAMES = ["chromium", "chromium-browser", "google-chrome", "google-chrome-stable"];
const HOW =
  "The end-to-end tests need Chromium: install it (Debian: apt-get install chromium) or set CHROMIUM_PATH to it.";

process.chdir(ROOT);
install();
const browser = findBrowser([SHELL]) ?? installBrowser(SHELL) ?? findBrowser(NAMES) ?? installBrowser("chromium");
if (browser === undefined) console.error(HOW);
build();

const words = ["run", "--reporter=default", "--reporter=./tests/support/slowest-files.ts", ...process.argv.slice(2)];
if (browser === undefined) words.push("--project", "numbers", "--project", "node", "--project", "browser-dom");
const results = process.env.VITEST_RESULTS;
if (results !== undefined) words.push("--reporter=json", `--outputFile.json=${results}`);
const code = runPackage("vitest/vitest.mjs", words, { env: { ...process.env, CHROMIUM_PATH: browser ?? "" } });
if (browser === undefined) console.error(HOW);
process.exit(browser === undefined ? code || 1 : code);

function findBrowser(names) {
  const named = process.env.CHROMIUM_PATH;
  if (named) return existsSync(named) ? named : undefined;
  const folders = (process.env.PATH ?? "").split(delimiter).concat("/usr/bin");
  const places = names.flatMap((name) => folders.map((folder) => join(folder, name)));
  places.push("/Applications/Google Chrome.app/Contents/MacOS/Google Chrome");
  return places.find((path) => existsSync(path));
}

/** Only where this may be done without asking: as root, where apt-get is. */
function installBrowser(name) {
  if (process.env.CHROMIUM_PATH) return undefined;
  if (process.platform !== "linux" || process.getuid?.() !== 0 || !existsSync("/usr/bin/apt-get")) return undefined;
  console.log(`Installing ${name} for the end-to-end tests.`);
  const apt = (...what) => spawnSync("apt-get", ["-qq", "-y", ...what], { stdio: "inherit" }).status === 0;
  if (!apt("install", name) && !(apt("update") && apt("install", name))) return undefined;
  return findBrowser([name]);
}
