import * as decoding from "lib0/decoding";
import { MESSAGE, SYNC } from "../../shared/schemas/sync.ts";

export interface Turnstile {
  /** A new connection begins. */
  connecting(): void;
  /** A write is about to be sent. */
  wrote(): void;
  readOnly(): boolean;
  /** The presence id of this page. */
  presenceId(): number;
}

/**
 * A WebSocket that counts the writes it sends, and holds back what the protocol does not want: updates before
 * the server's first question has been answered (the answer holds them), others' presence echoed, and anything but questions from a reader.
 */
export function countingSocket(Base: typeof WebSocket, turnstile: Turnstile): typeof WebSocket {
  return class extends Base {
    #answered = false;

    constructor(url: string | URL, protocols?: string | string[]) {
      super(url, protocols);
      turnstile.connecting();
    }

    override send(data: Parameters<WebSocket["send"]>[0]): void {
      if (data instanceof Uint8Array && !this.#lets(data)) return;
      super.send(data);
    }

    #lets(message: Uint8Array): boolean {
      const decoder = decoding.createDecoder(message);
      const type = decoding.readVarUint(decoder);
      if (type === MESSAGE.presence) return !turnstile.readOnly() && names(decoder, turnstile.presenceId());
      const kind = type === MESSAGE.sync ? decoding.readVarUint(decoder) : SYNC.ask;
      if (kind === SYNC.ask) return true;
      if (turnstile.readOnly() || (kind === SYNC.update && !this.#answered)) return false;
      this.#answered = true;
      turnstile.wrote();
      return true;
    }
  };
}

function names(decoder: decoding.Decoder, id: number): boolean {
  const entries = decoding.createDecoder(decoding.readVarUint8Array(decoder));
  for (let left = decoding.readVarUint(entries); left > 0; left--) {
    if (decoding.readVarUint(entries) === id) return true;
    decoding.readVarUint(entries);
    decoding.readVarString(entries);
  }
  return false;
}
