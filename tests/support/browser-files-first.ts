import { statSync } from "node:fs";
import type { TestSequencer, TestSpecification } from "vitest/node";

/** Starts the files that drive a browser first, then the largest: the short ones fill what is left at the end. */
export class BrowserFilesFirst implements TestSequencer {
  sort(files: TestSpecification[]): TestSpecification[] {
    const sized = files.map((file) => ({
      file,
      isBrowser: file.project.name === "e2e",
      bytes: statSync(file.moduleId).size,
    }));
    return sized
      .toSorted((a, b) => Number(b.isBrowser) - Number(a.isBrowser) || b.bytes - a.bytes)
      .map(({ file }) => file);
  }

  shard(): never {
    throw new Error("These tests are not made to be divided among machines.");
  }
}
