import { createRequire } from "node:module";
import { fileURLToPath } from "node:url";
import { type MessagePort, parentPort, workerData } from "node:worker_threads";
import type { RunControl, Task } from "../run.ts";
import { Board } from "./board.ts";
import { failureOf } from "./failure.ts";
import type { Answer, Errand } from "./start-threads.ts";

/** A helper: for each errand it takes items as long as there are any, and answers each. */
const { answers } = workerData as { answers: MessagePort };

type Tasks = Record<string, Task<unknown, unknown, unknown>>;

/** The loader of TypeScript sources hooks into `require` on a thread like this, and not into `import`. */
const load: (module: string) => Promise<Tasks> | Tasks = import.meta.url.endsWith(".ts")
  ? (module) => createRequire(import.meta.url)(fileURLToPath(module))
  : (module) => import(module);

parentPort!.on("message", async ({ run, module, name, board: buffer, shared, items }: Errand) => {
  const board = new Board(buffer);
  const control: RunControl = { progress() {}, cancelled: () => board.stopped() };
  const task = (await load(module))[name];
  for (let item = board.claim(); item !== undefined; item = board.claim()) {
    const say = (answer: Pick<Answer, "result" | "failure">) =>
      answers.postMessage({ run, item: item!, ...answer } satisfies Answer);
    try {
      const result = task.run(shared, items[item], control);
      if (result !== undefined) say({ result });
    } catch (error) {
      say({ failure: failureOf(error) });
    }
    board.finish(item);
  }
});
