// npm run check: types, lint and boundaries, dead code. Runs all three, and says at the end which failed.
import { install, runPackage } from "./install.mjs";

const CHECKS = [
  ["types", "typescript/bin/tsc", ["-b"]],
  ["format, lint and boundaries", "@biomejs/biome/bin/biome", ["check", "--error-on-warnings"]],
  ["dead files, exports and packages", "knip/bin/knip.js", []],
];

install();
const outcomes = CHECKS.map(([name, script, words]) => ({ name, passed: runPackage(script, words) === 0 }));
for (const { name, passed } of outcomes) console.log(`check ${passed ? "passed" : "failed"}: ${name}`);
process.exit(outcomes.every(({ passed }) => passed) ? 0 : 1);
