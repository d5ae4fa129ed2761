import { spawnSync } from "node:child_process";
import { availableParallelism } from "node:os";
import { fileURLToPath } from "node:url";
import { say } from "./timing.ts";

/** The peak of a process that estimates, less the columns it estimates from: at most 300 MB, the program included. */
const MOST_MB = 300;
const script = fileURLToPath(new URL("../support/estimation-memory-process.ts", import.meta.url));
const megabytes = (bytes: number) => Math.round(bytes / 1e6);

for (const form of ["aids", "la-aids", "les"]) {
  for (const threads of [1, availableParallelism()]) {
    const words = ["--import", "tsx", script, form, "12", "1000000", String(threads)];
    const ran = spawnSync(process.execPath, words, { encoding: "utf8" });
    if (ran.status !== 0) throw new Error(ran.stderr);
    const { columns, before, peak } = JSON.parse(ran.stdout) as Record<"columns" | "before" | "peak", number>;
    say({
      figure: "memory",
      form,
      goods: 12,
      rows: 1_000_000,
      threads,
      columnsMB: megabytes(columns),
      beyondColumnsMB: megabytes(peak - columns),
      programAndColumnsMB: megabytes(before),
      atMostMB: MOST_MB,
    });
  }
}
