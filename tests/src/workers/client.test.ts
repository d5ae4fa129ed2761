import { describe, expect, it } from "vitest";
import { replyTo } from "../../../src/workers/answer.ts";
import { createEconomicsWorker, type WorkerLike } from "../../../src/workers/client.ts";
import type { Request } from "../../../src/workers/protocol.ts";
import { sampleCopy, sampleSlutsky } from "../../support/sample-findings.ts";

/** Answers as the worker does, a turn later, with everything passed as a worker passes it: by copy. */
function answering(held: Request[] | undefined = undefined) {
  const listeners = new Map<string, (event: never) => void>();
  const state = { terminated: false };
  const worker: WorkerLike = {
    postMessage: (request: Request) => {
      if (held) return void held.push(request);
      const reply = structuredClone(replyTo(structuredClone(request)));
      queueMicrotask(() => listeners.get("message")?.({ data: reply } as never));
    },
    addEventListener: (kind: string, listener: unknown) => {
      listeners.set(kind, listener as (event: never) => void);
    },
    terminate: () => {
      state.terminated = true;
    },
  } as WorkerLike;
  return { worker, state, fail: () => listeners.get("error")?.({} as never) };
}

const finding = sampleSlutsky();
const { fitted, point, priceScale, totalScale, pointName } = finding;

describe("the browser's worker", () => {
  it("recomputes a matrix to the very digits of the finding", async () => {
    const client = createEconomicsWorker(() => answering().worker);
    const at = await client.ask("matrix", { fitted, point, priceScale, totalScale, pointName });
    const { sample: _, ...checks } = finding.at.checks;
    expect(at).toEqual({ ...finding.at, checks });
  });

  it("answers several questions, each with its own answer", async () => {
    const client = createEconomicsWorker(() => answering().worker);
    const dearer = { ...point, total: 2 };
    const [base, other, verified] = await Promise.all([
      client.ask("matrix", { fitted, point, priceScale, totalScale, pointName }),
      client.ask("matrix", { fitted, point: dearer, priceScale, totalScale, pointName: "twice the total" }),
      client.ask("verification", sampleCopy()),
    ]);
    expect(other.share).not.toEqual(base.share);
    expect(other.checks.pointName).toBe("twice the total");
    expect(verified).toMatchObject({ fingerprintAgrees: true, largest: 0 });
  });

  it("refuses with the reason what cannot be computed", async () => {
    const client = createEconomicsWorker(() => answering().worker);
    const short = { ...point, prices: [1, 1] };
    await expect(client.ask("matrix", { fitted, point: short, priceScale, totalScale, pointName })).rejects.toThrow(
      /2/,
    );
  });

  it("refuses what is still asked when it is closed or breaks", async () => {
    const held: Request[] = [];
    const first = answering(held);
    const client = createEconomicsWorker(() => first.worker);
    const asked = client.ask("verification", sampleCopy());
    client.close();
    expect(first.state.terminated).toBe(true);
    await expect(asked).rejects.toThrow("given up");
    const second = answering(held);
    const other = createEconomicsWorker(() => second.worker).ask("verification", sampleCopy());
    second.fail();
    await expect(other).rejects.toThrow("could not run");
  });
});
