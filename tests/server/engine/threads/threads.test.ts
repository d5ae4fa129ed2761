import { spawnSync } from "node:child_process";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";
import { Refusal } from "../../../../server/engine/refusal.ts";
import { Cancelled, QUIET, type RunControl } from "../../../../server/engine/run.ts";
import { mapInOrder } from "../../../../server/engine/threads/map-in-order.ts";
import { startThreads } from "../../../../server/engine/threads/start-threads.ts";
import { endless, fail, harmonic, mark, refuseFrom, whoIsThere } from "../../../support/thread-tasks.ts";

const COUNTS = [1, 2, 3, 8] as const;
const controls = new Map<number, RunControl>(
  COUNTS.map((count) => [count, { ...QUIET, threads: startThreads(count) }]),
);
const on = (count: number) => controls.get(count)!;
const items = Array.from({ length: 40 }, (_, k) => 1000 + 37 * k);

/** Until every helper of two threads has been seen at work. */
function warm(): void {
  const tickets = new Int32Array(new SharedArrayBuffer(4));
  const until = performance.now() + 20_000;
  while (new Set(mapInOrder(on(2), whoIsThere, tickets, [...items.keys()])).size < 2) {
    if (performance.now() > until) throw new Error("no helper came");
  }
}

describe("a map over threads", () => {
  it("has helpers that take part, and keeps them", () => {
    warm();
    const tickets = new Int32Array(new SharedArrayBuffer(4));
    expect(new Set(mapInOrder(on(2), whoIsThere, tickets, [...items.keys()])).size).toBe(2);
  });

  it.each(COUNTS)("gives the same bits in the same order on %d threads", (count) => {
    const alone = mapInOrder(QUIET, harmonic, 0.1, items);
    for (let again = 0; again < 3; again++) expect(mapInOrder(on(count), harmonic, 0.1, items)).toEqual(alone);
    expect(alone[1]).toBe(harmonic.run(0.1, items[1], QUIET));
  });

  it.each(COUNTS)("does every item once, in shared memory, and tells how many are done (%d threads)", (count) => {
    const marks = new Int32Array(new SharedArrayBuffer(4 * items.length));
    const heard: number[] = [];
    mapInOrder(on(count), mark, marks, [...items.keys()], (done) => void heard.push(done));
    expect([...marks]).toEqual(items.map(() => 1));
    expect(heard.at(-1)).toBe(items.length);
    expect(heard).toEqual([...heard].sort((a, b) => a - b));
  });

  it.each(COUNTS)("throws the refusal of the first item that has one (%d threads)", (count) => {
    for (const from of [0, 5, 39]) {
      const refused = () => mapInOrder(on(count), refuseFrom, from, [...items.keys()]);
      expect(refused).toThrow(Refusal);
      expect(refused).toThrow(`Item ${from} is refused.`);
    }
    expect(() => mapInOrder(on(count), fail, null, [...items.keys()])).toThrow("three");
    expect(mapInOrder(on(count), harmonic, 1, [1, 2])).toEqual([1, 1.5]);
  });

  it.each(COUNTS)("stops within the items under way when cancelled (%d threads)", (count) => {
    const flags = new Int32Array(new SharedArrayBuffer(8));
    let cancelAt = Number.POSITIVE_INFINITY;
    const control: RunControl = {
      ...on(count),
      cancelled() {
        if (Atomics.load(flags, 0) > 0) cancelAt = Math.min(cancelAt, performance.now() + 50);
        return performance.now() > cancelAt;
      },
    };
    expect(() => mapInOrder(control, endless, flags, [...items.keys()])).toThrow(Cancelled);
    const until = performance.now() + 5_000;
    while (Atomics.load(flags, 0) !== Atomics.load(flags, 1)) {
      if (performance.now() > until) throw new Error("an item goes on");
    }
    expect(mapInOrder(on(count), harmonic, 1, [1, 2, 3])[2]).toBe(1 + 0.5 + 1 / 3);
  });
});

describe("threads", () => {
  it("do not keep a process alive", () => {
    const at = (path: string) => JSON.stringify(new URL(path, import.meta.url).href);
    const program = `
      import { mapInOrder } from ${at("../../../../server/engine/threads/map-in-order.ts")};
      import { startThreads } from ${at("../../../../server/engine/threads/start-threads.ts")};
      import { whoIsThere } from ${at("../../../support/thread-tasks.ts")};
      const control = { progress() {}, cancelled: () => false, threads: startThreads(3) };
      const tickets = new Int32Array(new SharedArrayBuffer(4));
      while (new Set(mapInOrder(control, whoIsThere, tickets, [...Array(40).keys()])).size < 3);
      console.log("done");
    `;
    const words = ["--import", "tsx", "--input-type=module", "--eval", program];
    const cwd = fileURLToPath(new URL("../../../..", import.meta.url));
    const ran = spawnSync(process.execPath, words, { cwd, timeout: 30_000, encoding: "utf8" });
    expect(ran.stderr).toBe("");
    expect(ran.stdout).toBe("done\n");
    expect(ran.status).toBe(0);
  });
});
