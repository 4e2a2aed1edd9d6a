/** Answers kept in memory under a key that changes with whatever they depend on; the least recently used goes first. */
export class AnswerCache<Value> {
  readonly #limit: number;
  readonly #kept = new Map<string, Promise<Value>>();

  constructor(limit: number) {
    this.#limit = limit;
  }

  /** The kept answer, or that of `work`; those who ask while it is being worked out share it. A failure isn't kept. */
  get(key: string, work: () => Promise<Value>): Promise<Value> {
    const kept = this.#kept.get(key);
    const value = kept ?? work();
    this.#kept.delete(key);
    this.#kept.set(key, value);
    if (kept) return kept;
    value.catch(() => {
      if (this.#kept.get(key) === value) this.#kept.delete(key);
    });
    for (const oldest of this.#kept.keys()) {
      if (this.#kept.size <= this.#limit) break;
      this.#kept.delete(oldest);
    }
    return value;
  }
}
