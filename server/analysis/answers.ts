/** Answers kept per investigation; the oldest fall out. */
const MOST_KEPT = 200;

/**
 * Answers that stay right until the graph changes, by question. The same question asked twice at
 * once is worked out once; a failure is not kept.
 */
export class Answers {
  #version = -1;
  #kept = new Map<string, Promise<unknown>>();

  /** Forgets everything. */
  clear(): void {
    this.#kept.clear();
  }

  get<T>(version: number, key: string, work: () => Promise<T>): Promise<T> {
    if (version !== this.#version) {
      this.#kept.clear();
      this.#version = version;
    }
    const kept = this.#kept.get(key);
    if (kept !== undefined) return kept as Promise<T>;
    const made = work();
    this.#kept.set(key, made);
    made.catch(() => {
      if (this.#kept.get(key) === made) this.#kept.delete(key);
    });
    const oldest = this.#kept.keys().next().value;
    if (this.#kept.size > MOST_KEPT && oldest !== undefined) this.#kept.delete(oldest);
    return made;
  }
}
