import { fileURLToPath } from "node:url";
import { MessageChannel, type MessagePort, receiveMessageOnPort, Worker } from "node:worker_threads";
import { Cancelled, type RunControl, type Task, type Threads } from "../run.ts";
import { Board } from "./board.ts";
import { errorOf, type Failure, failureOf } from "./failure.ts";

/** A run as a helper is told of it. */
export interface Errand {
  readonly run: number;
  readonly module: string;
  readonly name: string;
  readonly board: SharedArrayBuffer;
  readonly shared: unknown;
  readonly items: readonly unknown[];
}

/** What a helper answers about an item; nothing where the result is undefined. */
export interface Answer {
  readonly run: number;
  readonly item: number;
  readonly result?: unknown;
  readonly failure?: Failure;
}

interface Helper {
  readonly worker: Worker;
  readonly answers: MessagePort;
}

const WORTH_DIVIDING = 1e8;
const MILLISECONDS_BETWEEN_LOOKS = 20;
/** An item not finished for so long after everything else is done again here: its helper may be gone. */
const PATIENCE_MILLISECONDS = 10_000;

/**
 * Threads for the computations of the thread that calls this, itself included in `count`. Helpers are started
 * when first needed and reused; one that is still starting takes part when it is ready, nobody waits for it.
 * They end with the thread that started them and do not keep a process alive.
 */
export function startThreads(count: number, worthDividing: number = WORTH_DIVIDING): Threads {
  const helpers: Helper[] = [];
  let runs = 0;

  function helpersFor(items: number): readonly Helper[] {
    while (helpers.length < Math.min(count, items) - 1) helpers.push(startHelper(forget));
    return helpers.slice(0, Math.min(count, items) - 1);
  }

  function forget(worker: Worker): void {
    const at = helpers.findIndex((helper) => helper.worker === worker);
    if (at >= 0) helpers.splice(at, 1)[0].answers.close();
  }

  return {
    count,
    worthDividing,
    map<Shared, Item, Result>(
      task: Task<Shared, Item, Result>,
      shared: Shared,
      items: readonly Item[],
      control: RunControl,
      onDone: (done: number) => void,
    ): Result[] {
      const board = new Board(items.length);
      const run = ++runs;
      const errand: Errand = { run, module: task.module, name: task.name, board: board.buffer, shared, items };
      const called = helpersFor(items.length);
      for (const { worker } of called) worker.postMessage(errand);
      const own: RunControl = { progress() {}, cancelled: control.cancelled };
      const results: Result[] = new Array(items.length);
      const failures = new Map<number, Failure>();

      const collect = () => {
        for (const { answers } of called) {
          for (let next = receiveMessageOnPort(answers); next; next = receiveMessageOnPort(answers)) {
            const { run: of, item, result, failure } = next.message as Answer;
            if (of !== run) continue;
            if (failure) failures.set(item, failure);
            else results[item] = result as Result;
          }
        }
        if (failures.size > 0) board.close();
      };
      const work = (item: number) => {
        try {
          results[item] = task.run(shared, items[item], own);
        } catch (error) {
          if (control.cancelled()) throw error;
          failures.set(item, failureOf(error));
        }
        board.finish(item);
      };
      const look = () => {
        if (control.cancelled()) throw new Cancelled("cancelled");
        onDone(board.finished());
        collect();
      };

      try {
        for (let item = board.claim(); item !== undefined; item = board.claim()) {
          work(item);
          look();
        }
        // Items before the first failure were all claimed: the failure told is the same on any number of threads.
        const end = () => Math.min(items.length, ...failures.keys());
        let since = performance.now();
        let seen = board.finished();
        for (let left = board.firstUnfinished(end()); left !== undefined; left = board.firstUnfinished(end())) {
          board.waitBeyond(seen, MILLISECONDS_BETWEEN_LOOKS);
          if (board.finished() !== seen) since = performance.now();
          seen = board.finished();
          if (performance.now() - since > PATIENCE_MILLISECONDS) work(left);
          look();
        }
        collect();
        const first = failures.get(end());
        if (first) throw errorOf(first);
        return results;
      } finally {
        board.stop();
      }
    },
  };
}

function startHelper(forget: (worker: Worker) => void): Helper {
  const { port1, port2 } = new MessageChannel();
  const options = { workerData: { answers: port2 }, transferList: [port2] };
  const isSource = import.meta.url.endsWith(".ts");
  const file = new URL(isSource ? "./thread.ts" : "./thread.js", import.meta.url);
  // From the TypeScript sources, a thread needs a loader as the program does, and one that asks nothing of the
  // thread that starts it: that one computes.
  const worker = isSource
    ? new Worker(`require(${JSON.stringify(fileURLToPath(file))})`, {
        ...options,
        eval: true,
        execArgv: ["--require", "tsx/cjs"],
      })
    : new Worker(file, { ...options, execArgv: [] });
  worker.on("error", () => forget(worker));
  worker.on("exit", () => forget(worker));
  worker.unref();
  return { worker, answers: port1 };
}
