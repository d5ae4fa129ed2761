import { availableParallelism } from "node:os";
import tailwindcss from "@tailwindcss/vite";
import react from "@vitejs/plugin-react";
import { defineConfig } from "vitest/config";
import { BrowserFilesFirst } from "./tests/support/browser-files-first.ts";

/** Tests of what computes: without a server, a database or a page. */
const NUMBERS = ["tests/{shared,laws,reference,server/engine}/**/*.test.ts"];

export default defineConfig({
  plugins: [react(), tailwindcss()],
  publicDir: "src/public",
  build: { outDir: "dist/client", emptyOutDir: true, target: "es2022" },
  worker: { format: "es" },
  test: {
    // By itself vitest leaves one core to itself, half of a machine that has two.
    maxWorkers: availableParallelism(),
    sequence: { sequencer: BrowserFilesFirst },
    projects: [
      {
        test: {
          name: "numbers",
          environment: "node",
          include: NUMBERS,
          // They only compute and share nothing that they change: what one file has read is there for the next.
          isolate: false,
          testTimeout: 60_000,
        },
      },
      {
        test: {
          name: "node",
          environment: "node",
          include: ["tests/{server,sync,architecture}/**/*.test.ts"],
          exclude: NUMBERS,
          testTimeout: 60_000,
          hookTimeout: 60_000,
        },
      },
      {
        extends: true,
        test: {
          name: "browser-dom",
          environment: "jsdom",
          include: ["tests/src/**/*.test.{ts,tsx}"],
          setupFiles: ["tests/support/dom.ts"],
          testTimeout: 30_000,
        },
      },
      {
        test: {
          name: "e2e",
          environment: "node",
          include: ["tests/e2e/**/*.test.ts"],
          // Each step has a patience of its own (tests/e2e/support.ts), which says better what was waited for.
          testTimeout: 900_000,
          hookTimeout: 900_000,
          globalSetup: ["tests/e2e/demo-data.ts"],
        },
      },
    ],
  },
});
