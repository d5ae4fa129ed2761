/**
 * Which of one's own edits the server has called stored. State vectors do not tell: a deletion leaves them as they are.
 * So edits are counted, and each write of the connection notes how many edits it and those before it hold.
 */
export class EditLedger {
  #made: number;
  #stored = 0;
  #confirmed = false;
  /** Of the writes of this connection not yet acknowledged: the edits held up to each. */
  #held: number[] = [];
  #acknowledged = 0;

  /** `found` edits were kept from an earlier visit. */
  constructor(found = 0) {
    this.#made = found;
  }

  /** More edits of an earlier visit than were known. */
  found(edits: number): void {
    this.#made += edits;
  }

  edited(): void {
    this.#made += 1;
  }

  /** A new connection counts its writes from 1, and its first write holds every edit there is. */
  connecting(): void {
    this.#held = [];
    this.#acknowledged = 0;
  }

  wrote(): void {
    this.#held.push(this.#made);
  }

  /** The server has stored writes 1 to `writes` of this connection. */
  acknowledged(writes: number): void {
    const fresh = Math.min(writes - this.#acknowledged, this.#held.length);
    if (fresh <= 0) return;
    this.#stored = Math.max(this.#stored, this.#held[fresh - 1]);
    this.#held.splice(0, fresh);
    this.#acknowledged += fresh;
    this.#confirmed = true;
  }

  get unstored(): number {
    return this.#made - this.#stored;
  }

  /** Also what was kept from an earlier visit has reached the server since the page was opened. */
  get everythingStored(): boolean {
    return this.#confirmed && this.unstored === 0;
  }
}
