import { execFileSync } from "node:child_process";
import { copyFileSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, expect, test } from "vitest";
import { finding } from "../../shared/schemas/cell.ts";

const ROOT = join(import.meta.dirname, "..", "..");
let folder: string;

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "tangency-first-study-"));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

test("the first study of README.md is ten lines and runs as printed", () => {
  const readme = readFileSync(join(ROOT, "README.md"), "utf8");
  const [, study] = /```yaml\n([\s\S]*?)```/.exec(readme) ?? [];
  expect(study.trim().split("\n").length).toBeLessThanOrEqual(10);
  writeFileSync(join(folder, "tuna.yaml"), study);
  copyFileSync(join(ROOT, "tests/reference/fixtures/tuna-weekly.csv"), join(folder, "tuna-weekly.csv"));

  const printed = execFileSync("npm", ["run", "--silent", "estimate", "--", join(folder, "tuna.yaml")], { cwd: ROOT });

  const findings = JSON.parse(printed.toString());
  expect(Object.keys(findings)).toEqual(["weeks", "base", "matrix"]);
  for (const one of Object.values(findings)) expect(finding.safeParse(one).success).toBe(true);
  expect(findings.weeks.accounting.used).toBe(338);
});

test("the settings that DEVELOPERS.md names are the ones the program reads", () => {
  const developers = readFileSync(join(ROOT, "DEVELOPERS.md"), "utf8");
  const config = readFileSync(join(ROOT, "server/config.ts"), "utf8");
  const named = [...developers.matchAll(/`((?:TANGENCY_)[A-Z_]+)`/g)].map((found) => found[1]);
  const read = [...config.matchAll(/\b(TANGENCY_[A-Z_]+)\b/g)].map((found) => found[1]);
  expect(new Set(named)).toEqual(new Set(read));
});
