import type { QuestionKind, Questions, Reply, Request } from "./protocol.ts";

/** The part of a Worker that is used; tests answer in its place. */
export type WorkerLike = Pick<Worker, "postMessage" | "addEventListener" | "terminate">;

export interface EconomicsWorker {
  readonly ask: <K extends QuestionKind>(kind: K, ask: Questions[K]["ask"]) => Promise<Questions[K]["answer"]>;
  readonly close: () => void;
}

const spawn = (): WorkerLike => new Worker(new URL("./economics.worker.ts", import.meta.url), { type: "module" });

interface Waiting {
  readonly resolve: (answer: never) => void;
  readonly reject: (reason: Error) => void;
}

/** A typed client of the worker: one promise a question; all are refused when the worker is closed or breaks. */
export function createEconomicsWorker(start: () => WorkerLike = spawn): EconomicsWorker {
  const worker = start();
  const waiting = new Map<number, Waiting>();
  let asked = 0;
  const refuseAll = (reason: string) => {
    for (const { reject } of waiting.values()) reject(new Error(reason));
    waiting.clear();
  };
  worker.addEventListener("message", ({ data }: MessageEvent<Reply>) => {
    const one = waiting.get(data.id);
    waiting.delete(data.id);
    if ("refusal" in data) one?.reject(new Error(data.refusal));
    else one?.resolve(data.answer as never);
  });
  worker.addEventListener("error", () => refuseAll("the browser could not run the computation"));
  return {
    ask: (kind, ask) =>
      new Promise((resolve, reject) => {
        asked += 1;
        waiting.set(asked, { resolve, reject });
        worker.postMessage({ id: asked, kind, ask } satisfies Request);
      }),
    close: () => {
      worker.terminate();
      refuseAll("the computation was given up");
    },
  };
}
