import { spawnSync } from "node:child_process";
import { copyFileSync, existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { afterEach, beforeEach, describe, expect, test } from "vitest";
import { temporaryFolder } from "../../support/temporary.ts";

const BIN = join(import.meta.dirname, "..", "..", "..", "server", "bin");

/** A tree with the scripts in it; what they call is written down in `calls` and does nothing else. */
let tree: ReturnType<typeof temporaryFolder>;
const at = (path: string) => join(tree.path, path);
const calls = () => (existsSync(at("calls")) ? readFileSync(at("calls"), "utf8").trim().split("\n") : []);
const STUB = (exit = 0) => `
const { appendFileSync } = require("node:fs");
appendFileSync(process.env.CALLS, process.argv.slice(1).map((word) => word.split("/").at(-1)).join(" ") + "\\n");
process.exit(${exit});`;

function put(path: string, text: string): void {
  mkdirSync(dirname(at(path)), { recursive: true });
  writeFileSync(at(path), text);
}
const lock = (path: string, packages: Record<string, unknown>) => put(path, JSON.stringify({ packages }));

function run(code: string) {
  const { status, stdout, stderr } = spawnSync(process.execPath, ["--input-type=module", "-e", code], {
    cwd: at("."),
    encoding: "utf8",
    env: { ...process.env, CALLS: at("calls"), npm_execpath: at("npm.js") },
  });
  return { status, said: stdout + stderr };
}
const INSTALL = 'import { install } from "./server/bin/install.mjs"; install();';
const BUILD = 'import { build } from "./server/bin/build.mjs"; build();';

beforeEach(() => {
  tree = temporaryFolder();
  mkdirSync(at("server/bin"), { recursive: true });
  for (const name of ["install.mjs", "build.mjs"]) copyFileSync(join(BIN, name), at(`server/bin/${name}`));
  put("npm.js", STUB());
  put("node_modules/typescript/bin/tsc", STUB());
  put("node_modules/vite/bin/vite.js", STUB());
  const wanted = { "node_modules/a": { version: "1.0.0" }, "node_modules/b": { version: "2.0.0", optional: true } };
  lock("package-lock.json", { "": {}, ...wanted });
  lock("node_modules/.package-lock.json", wanted);
});
afterEach(() => tree.remove());

describe("install", () => {
  test("leaves what is there alone, other platforms' packages included", () => {
    expect(run(INSTALL)).toEqual({ status: 0, said: "" });
    lock("node_modules/.package-lock.json", { "node_modules/a": { version: "1.0.0" } });
    expect(run(INSTALL)).toEqual({ status: 0, said: "" });
    expect(calls()).toEqual([]);
  });

  test.each([
    ["none are installed", undefined],
    ["node_modules/a is missing", {}],
    ["node_modules/a is 0.9.0 and should be 1.0.0", { "node_modules/a": { version: "0.9.0" } }],
  ])("runs npm ci when %s, and says so", (why, packages) => {
    if (packages === undefined) rmSync(at("node_modules/.package-lock.json"));
    else lock("node_modules/.package-lock.json", packages);
    expect(run(INSTALL)).toEqual({ status: 0, said: expect.stringContaining(`Installing packages (${why})`) });
    expect(calls()).toEqual(["npm.js ci --include=dev --no-audit --no-fund"]);
  });

  test("ends with a sentence when npm fails, or Node is too old", () => {
    put("npm.js", STUB(1));
    rmSync(at("node_modules/.package-lock.json"));
    expect(run(INSTALL)).toEqual({ status: 1, said: expect.stringContaining("npm ci failed") });
    const old = 'Object.defineProperty(process, "versions", { value: { node: "20.18.3" } });';
    const code = `${old} const { install } = await import("./server/bin/install.mjs"); install();`;
    expect(run(code)).toEqual({ status: 1, said: "Tangency needs Node.js 20.19 or newer, and this is 20.18.3.\n" });
  });
});

describe("build", () => {
  test("compiles once, and again when a source has changed or gone", () => {
    put("shared/law.ts", "export const law = 1;");
    expect(run(BUILD).status).toBe(0);
    expect(calls()).toEqual(["tsc -b server", "vite.js build --logLevel warn"]);
    run(BUILD);
    expect(calls()).toHaveLength(2);
    put("shared/law.ts", "export const law = 2;");
    run(BUILD);
    expect(calls()).toHaveLength(4);
    rmSync(at("shared/law.ts"));
    run(BUILD);
    expect(calls()).toHaveLength(6);
  });

  test("that fails says so, and is tried again the next time", () => {
    put("node_modules/vite/bin/vite.js", STUB(1));
    expect(run(BUILD)).toEqual({ status: 1, said: expect.stringContaining("The pages do not build") });
    put("node_modules/vite/bin/vite.js", STUB());
    expect(run(BUILD).status).toBe(0);
    expect(calls()).toHaveLength(4);
  });
});
