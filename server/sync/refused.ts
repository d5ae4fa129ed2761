import { CLOSE, type CloseCode } from "../../shared/schemas/sync.ts";

/** Something on the socket is refused; the code closes it, the sentence is the reason (at most 123 bytes go over the wire). */
export class SyncRefused extends Error {
  readonly code: CloseCode;

  constructor(code: CloseCode, sentence: string) {
    super(sentence);
    this.name = "SyncRefused";
    this.code = code;
  }
}

export const malformed = (sentence: string) => new SyncRefused(CLOSE.malformed, sentence);
export const tooLarge = (sentence: string) => new SyncRefused(CLOSE.tooLarge, sentence);

/** RFC 6455 allows 123 bytes of reason; whole characters are kept. */
export function closeReason(sentence: string): string {
  let reason = sentence;
  while (Buffer.byteLength(reason) > 123) reason = reason.slice(0, -1);
  return reason;
}
