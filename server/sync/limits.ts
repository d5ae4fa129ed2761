/** Sizes and rates of PROTOCOL.md; a test may set its own. */
export interface Limits {
  /** Longest message that is read, in bytes. */
  readonly message: number;
  /** Above this the socket layer cuts the connection before reading on, in bytes. */
  readonly hardCap: number;
  readonly presenceMessage: number;
  readonly presenceState: number;
  /** In characters. */
  readonly source: number;
  readonly cells: number;
  /** Stored rows of one study, in bytes. */
  readonly document: number;
  readonly connectionsOfPerson: number;
  readonly connectionsOfStudy: number;
  readonly messagesPerSecond: number;
  readonly messageBurst: number;
  /** Bytes waiting for a client that does not read. */
  readonly unread: number;
  readonly heartbeatMs: number;
  readonly unloadAfterMs: number;
  readonly changedAfterMs: number;
  /** Rows after which the document is compacted. */
  readonly rows: number;
}

export const LIMITS: Limits = {
  message: 1_048_576,
  hardCap: 2_097_152,
  presenceMessage: 65_536,
  presenceState: 4_096,
  source: 262_144,
  cells: 400,
  document: 25_165_824,
  connectionsOfPerson: 12,
  connectionsOfStudy: 300,
  messagesPerSecond: 400,
  messageBurst: 2_000,
  unread: 8_388_608,
  heartbeatMs: 10_000,
  unloadAfterMs: 60_000,
  changedAfterMs: 120,
  rows: 500,
};

/** A bucket of messages that refills with time. */
export class Allowance {
  #left: number;
  #at: number;
  readonly #limits: Limits;

  constructor(limits: Limits, now: number) {
    this.#limits = limits;
    this.#left = limits.messageBurst;
    this.#at = now;
  }

  take(cost: number, now: number): boolean {
    const refill = (Math.max(0, now - this.#at) / 1000) * this.#limits.messagesPerSecond;
    this.#left = Math.min(this.#limits.messageBurst, this.#left + refill) - cost;
    this.#at = now;
    return this.#left >= 0;
  }
}
