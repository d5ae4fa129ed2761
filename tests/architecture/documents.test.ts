import { existsSync, readdirSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { describe, expect, test } from "vitest";

const ROOT = join(import.meta.dirname, "..", "..");
const TOP = new Set(readdirSync(ROOT));
const scripts = JSON.parse(readFileSync(join(ROOT, "package.json"), "utf8")).scripts as Record<string, string>;

describe.each(["README.md", "DEVELOPERS.md"])("%s", (name) => {
  const text = readFileSync(join(ROOT, name), "utf8");

  test("names only commands that are there", () => {
    const named = [...text.matchAll(/\bnpm (?:run (?:--silent )?([\w:-]+)|(start|test)\b)/g)].map(
      (found) => found[1] ?? found[2],
    );
    expect(named.length).toBeGreaterThan(0);
    for (const script of named) expect(Object.keys(scripts), `npm run ${script}`).toContain(script);
  });

  test("names only paths that are there", () => {
    const spans = [...text.matchAll(/`([^`\n]+)`|\]\(([^)\s]+)\)/g)].map((found) => found[1] ?? found[2]);
    const paths = spans.filter((span) => isPath(span)).flatMap(alternatives);
    expect(paths.length).toBeGreaterThan(0);
    for (const path of paths) expect(existsSync(join(ROOT, beforePlaceholder(path))), path).toBe(true);
  });
});

test("every command of package.json begins with a program that is there", () => {
  for (const [script, command] of Object.entries(scripts)) {
    const [program, file] = command.split(" ");
    const path = program === "node" ? join(ROOT, file) : join(ROOT, "node_modules", ".bin", program);
    expect(existsSync(path), script).toBe(true);
  }
});

/** Something of this tree: its first part stands at the top. */
function isPath(span: string): boolean {
  return /^\.?[\w@.{},<>/*-]+$/.test(span) && span.includes("/") && TOP.has(span.replace(/^\.\//, "").split("/")[0]);
}

/** `a/{b,c}.ts` as a/b.ts and a/c.ts. */
function alternatives(path: string): string[] {
  const braces = /\{([^{}]*)\}/.exec(path);
  if (braces === null) return [path];
  return braces[1].split(",").flatMap((one) => alternatives(path.replace(braces[0], one.trim())));
}

/** `shared/systems/<name>.ts` says that shared/systems is there. */
function beforePlaceholder(path: string): string {
  const at = path.search(/[<*]/);
  return at < 0 ? path : dirname(`${path.slice(0, at)}x`);
}
