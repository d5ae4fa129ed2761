/** A few values kept by key, the least recently used given up first; together never heavier than a limit, but for one. */
export class Recent<T> {
  readonly #kept = new Map<string, { readonly value: T; readonly bytes: number }>();
  readonly #limit: number;
  #bytes = 0;

  constructor(limitBytes: number) {
    this.#limit = limitBytes;
  }

  get(key: string): T | undefined {
    const entry = this.#kept.get(key);
    if (!entry) return undefined;
    this.#kept.delete(key);
    this.#kept.set(key, entry);
    return entry.value;
  }

  set(key: string, value: T, bytes: number): void {
    this.#drop(key);
    this.#kept.set(key, { value, bytes });
    this.#bytes += bytes;
    for (const oldest of this.#kept.keys()) {
      if (this.#bytes <= this.#limit || this.#kept.size === 1) return;
      this.#drop(oldest);
    }
  }

  #drop(key: string): void {
    this.#bytes -= this.#kept.get(key)?.bytes ?? 0;
    this.#kept.delete(key);
  }
}
