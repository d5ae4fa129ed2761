// npm run bench: runs every *.bench.ts beside this file, one after another; each prints its figures.
import { readdirSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { install, runPackage } from "../../server/bin/install.mjs";

install();
const folder = dirname(fileURLToPath(import.meta.url));
const wanted = process.argv.slice(2);
const files = readdirSync(folder).filter(
  (name) => name.endsWith(".bench.ts") && wanted.every((word) => name.includes(word)),
);
const codes = files.map((name) => {
  console.log(`\n${name.replace(".bench.ts", "")}`);
  return runPackage("tsx/dist/cli.mjs", [join(folder, name)]);
});
process.exit(codes.every((code) => code === 0) ? 0 : 1);
