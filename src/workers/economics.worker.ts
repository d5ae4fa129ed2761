import { replyTo } from "./answer.ts";
import type { Request } from "./protocol.ts";

/** Off the main thread: a page stays at hand while a matrix is computed. */
self.addEventListener("message", ({ data }: MessageEvent<Request>) => {
  self.postMessage(replyTo(data));
});
