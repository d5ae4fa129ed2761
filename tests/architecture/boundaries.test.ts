import { spawnSync } from "node:child_process";
import { mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { temporaryFolder } from "../support/temporary.ts";

const ROOT = join(import.meta.dirname, "..", "..");

/** A file that breaks a boundary: where it would stand, what it would import, what it is told. */
const FAULTS = [
  ["shared/numerics", "node:fs", "shared/ runs unchanged"],
  ["shared/numerics", "../systems/aids.ts", "numerics/ knows numbers only"],
  ["shared/systems", "../economics/slutsky.ts", "systems/ knows numerics/ only"],
  ["shared/economics", "../tables/table.ts", "economics/ is pure functions"],
  ["shared/economics/price-change", "../../tables/table.ts", "economics/ is pure functions"],
  ["shared/schemas", "../systems/aids.ts", "schemas/ say shapes only"],
  ["shared/schemas", "../../server/errors.ts", "shared/ runs unchanged"],
  ["shared/study", "../economics/slutsky.ts", "study/ reads and orders"],
  ["shared/study/columns", "../../economics/slutsky.ts", "study/ reads and orders"],
  ["shared/study", "yjs", "shared/ runs unchanged"],
  ["shared/tables", "../study/resolve.ts", "tables/ print findings"],
  ["shared/tables", "react", "shared/ runs unchanged"],
  ["shared/bundle", "../economics/slutsky.ts", "bundle/ puts texts together"],
  ["shared/bundle", "node:fs", "shared/ runs unchanged"],
  ["server/engine/cells", "../../db/client.ts", "The engine computes"],
  ["server/engine/columns", "express", "The engine computes"],
  ["server/engine/inference", "../../http/errors.ts", "The engine computes"],
  ["server/engine/estimation", "../../../shared/economics/slutsky.ts", "estimation/ fits coefficients"],
  ["server/engine/estimation", "../../sync/index.ts", "The engine computes"],
  ["server/routes", "../db/queries/studies.ts", "Routes validate"],
  ["server/routes", "drizzle-orm", "Routes validate"],
  ["server/presenters", "../db/client.ts", "Routes validate"],
  ["server/http", "../../shared/numerics/matrix.ts", "Routes validate"],
  ["server/services", "express", "Services know no request"],
  ["server/services", "../sync/index.ts", "Services know no request"],
  ["server/policies", "../db/client.ts", "policies/ decide"],
  ["server/db", "../services/access.ts", "db/ and storage/ stand at the bottom"],
  ["server/storage", "../http/errors.ts", "db/ and storage/ stand at the bottom"],
  ["server/jobs", "../routes/cells.ts", "jobs/ run the engine"],
  ["server/sync", "../engine/run.ts", "sync/ carries edits"],
  ["server/services", "../../src/lib/api.ts", "The server knows no page"],
  ["src/features/studies", "../people/list.ts", "A feature knows no other"],
  ["src/features/studies/api", "../../people/api/get-people.ts", "A feature knows no other"],
  ["src/features/studies", "../../cells/index.ts", "A feature knows no other"],
  ["src/features/studies", "../../../server/errors.ts", "Pages reach the server"],
  ["src/cells/system", "../slutsky/view.tsx", "A kind of cell knows no other kind"],
  ["src/cells/system", "../../features/studies/list.ts", "A kind of cell knows no other kind"],
  ["src/components", "../features/studies/list.ts", "components/ know no product"],
  ["src/sync", "../cells/index.ts", "sync/ is an engine"],
  ["src/workers", "react", "workers/ compute"],
  ["src/app", "../../server/errors.ts", "Pages reach the server"],
] as const;

/** What is meant to be allowed, so that a rule that forbids everything does not pass for a good one. */
const FINE = [
  ["shared/schemas", "../systems/names.ts"],
  ["server/routes", "../services/studies.ts"],
  ["server/services", "../db/client.ts"],
  ["src/features/studies", "./api/get-studies.ts"],
  ["src/features/studies/api", "../../../lib/api.ts"],
  ["src/cells/system", "../../components/table.tsx"],
  ["src/cells/system", "../form/field.tsx"],
] as const;

const fileOf = (folder: string, kind: string, i: number) => join(folder, `seeded-${kind}-${i}.ts`);
const folder = temporaryFolder();
let told: Map<string, string>;

beforeAll(() => {
  const config = JSON.parse(readFileSync(join(ROOT, ".biome.json"), "utf8"));
  put(".biome.json", JSON.stringify({ ...config, vcs: undefined }));
  FAULTS.forEach(([where, what], i) => {
    put(fileOf(where, "fault", i), `import type { Thing } from "${what}";\nexport type Other = Thing;\n`);
  });
  FINE.forEach(([where, what], i) => {
    put(fileOf(where, "fine", i), `import type { Thing } from "${what}";\nexport type Other = Thing;\n`);
  });
  put("shared/cycle-a.ts", 'import type { B } from "./cycle-b.ts";\nexport type A = B[];\n');
  put("shared/cycle-b.ts", 'import type { A } from "./cycle-a.ts";\nexport type B = A | 1;\n');
  told = lint();
});
afterAll(() => folder.remove());

function put(path: string, text: string): void {
  mkdirSync(dirname(join(folder.path, path)), { recursive: true });
  writeFileSync(join(folder.path, path), text);
}

/** What the linter says of each file, under the project's own rules. */
function lint(): Map<string, string> {
  const biome = join(ROOT, "node_modules", "@biomejs", "biome", "bin", "biome");
  const words = [biome, "lint", "--reporter=json", "--max-diagnostics=none", folder.path];
  const { stdout } = spawnSync(process.execPath, words, { cwd: folder.path, encoding: "utf8" });
  const by = new Map<string, string>();
  for (const diagnostic of JSON.parse(stdout).diagnostics) {
    const path: string = diagnostic.location.path.file ?? diagnostic.location.path;
    const name = path.replace(`${folder.path}/`, "");
    by.set(name, `${by.get(name) ?? ""}${diagnostic.category} ${JSON.stringify(diagnostic)}\n`);
  }
  return by;
}

describe("an import across a boundary is caught, with where the code belongs instead", () => {
  test.each(FAULTS.map((fault, i) => [...fault, i] as const))("%s imports %s: %s", (where, _what, sentence, i) => {
    const said = told.get(fileOf(where, "fault", i)) ?? "";
    expect(said).toContain("noRestrictedImports");
    expect(said).toContain(sentence);
  });

  test.each(FINE.map((fine, i) => [...fine, i] as const))("%s may import %s", (where, _what, i) => {
    expect(told.get(fileOf(where, "fine", i)) ?? "").not.toContain("noRestrictedImports");
  });

  test("a circle of imports, of types only, is caught", () => {
    expect(told.get("shared/cycle-a.ts")).toContain("noImportCycles");
  });
});

test("the compiler knows no document and no process in shared/, and no document in server/", () => {
  for (const [where, line, missing] of [
    ["shared", "export const title = document.title;", "document"],
    ["shared", "export const home = process.env.HOME;", "process"],
    ["server", "export const title = document.title;", "document"],
  ]) {
    const { compilerOptions } = JSON.parse(readFileSync(join(ROOT, where, "tsconfig.json"), "utf8"));
    const base = JSON.parse(readFileSync(join(ROOT, "shared", "tsconfig.json"), "utf8")).compilerOptions;
    const types = compilerOptions.types ?? base.types;
    put(
      "compiled/tsconfig.json",
      JSON.stringify({
        compilerOptions: {
          lib: base.lib,
          types,
          typeRoots: [join(ROOT, "node_modules", "@types")],
          noEmit: true,
          skipLibCheck: true,
        },
        files: ["seeded.ts"],
      }),
    );
    put("compiled/seeded.ts", line);
    const tsc = join(ROOT, "node_modules", "typescript", "bin", "tsc");
    const { stdout } = spawnSync(process.execPath, [tsc, "-p", join(folder.path, "compiled")], { encoding: "utf8" });
    expect(stdout, where).toContain(`Cannot find name '${missing}'`);
  }
});
