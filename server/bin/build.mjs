// Compiles server and pages into dist/, unless what is there was made from these very sources.
import { createHash } from "node:crypto";
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { join, relative } from "node:path";
import { fail, install, ROOT, runDirectly, runPackage } from "./install.mjs";

const SOURCES = ["shared", "server", "src", "index.html", "vite.config.ts", "tailwind.config.ts", "package-lock.json"];
const DIST = join(ROOT, "dist");
const STAMP = join(DIST, "built-from");

export function build({ always = false } = {}) {
  const from = fingerprintOfSources();
  if (!always && existsSync(STAMP) && readFileSync(STAMP, "utf8") === from) return;
  console.log("Building.");
  // A file that is gone from the sources must be gone from the program too.
  for (const made of ["built-from", "server", "shared", "server.tsbuildinfo", "shared.tsbuildinfo"]) {
    rmSync(join(DIST, made), { recursive: true, force: true });
  }
  if (runPackage("typescript/bin/tsc", ["-b", "server"]) !== 0) fail("The server does not compile; see above.");
  if (runPackage("vite/bin/vite.js", ["build", "--logLevel", "warn"]) !== 0) fail("The pages do not build; see above.");
  mkdirSync(DIST, { recursive: true });
  writeFileSync(STAMP, from);
}

function fingerprintOfSources() {
  const hash = createHash("sha256");
  for (const path of SOURCES.flatMap((name) => filesUnder(join(ROOT, name))).sort()) {
    hash
      .update(`${relative(ROOT, path)}\0`)
      .update(readFileSync(path))
      .update("\0");
  }
  return hash.digest("hex");
}

function filesUnder(path) {
  if (!existsSync(path)) return [];
  if (!statSync(path).isDirectory()) return [path];
  return readdirSync(path).flatMap((entry) => filesUnder(join(path, entry)));
}

if (runDirectly(import.meta.url)) {
  install();
  build({ always: true });
}
