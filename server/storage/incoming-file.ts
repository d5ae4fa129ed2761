import { addAbortSignal } from "node:stream";
import type { StorageEngine } from "multer";

/** Where the file of a request goes as it comes in: nothing is gathered in memory or on disk before. */
export interface Destination<Request> {
  /** Stores the stream and returns the id it is stored under. Rejects when it will not have it. */
  store(request: Request, name: string, stream: AsyncIterable<Uint8Array>): Promise<string>;
  /** The request failed later on: take it away again. */
  discard(id: string): void;
}

/** Tells multer to hand the file's stream on. A client that goes away in the middle ends the stream with an error. */
export function streamingTo<Request>(destination: Destination<Request>): StorageEngine {
  return {
    _handleFile(request, file, done) {
      const gone = new AbortController();
      const leave = () => gone.abort();
      request.once("aborted", leave);
      addAbortSignal(gone.signal, file.stream);
      destination
        .store(request as Request, file.originalname, file.stream)
        .then((id) => done(null, { filename: id }), done)
        .finally(() => request.off("aborted", leave));
    },
    _removeFile(_request, file, done) {
      if (file.filename !== undefined) destination.discard(file.filename);
      done(null);
    },
  };
}
