import { replyTo } from "../../src/workers/answer.ts";
import type { WorkerLike } from "../../src/workers/client.ts";
import type { Reply, Request } from "../../src/workers/protocol.ts";

/** A worker within the test: answers as the browser's does, a turn later, everything passed by copy. */
export class AnsweringWorker implements WorkerLike {
  /** Every request that any of them got, for whoever counts. */
  static readonly requests: Request[] = [];
  #listener: ((event: MessageEvent<Reply>) => void) | undefined;

  postMessage(request: Request): void {
    AnsweringWorker.requests.push(request);
    const reply = structuredClone(replyTo(structuredClone(request)));
    queueMicrotask(() => this.#listener?.({ data: reply } as MessageEvent<Reply>));
  }

  addEventListener(kind: string, listener: unknown): void {
    if (kind === "message") this.#listener = listener as (event: MessageEvent<Reply>) => void;
  }

  terminate(): void {
    this.#listener = undefined;
  }
}
