/** Long enough to come back for it at once; what was found is older than the page by no more. */
const KEEP_MS = 15_000;
const MOST_KEPT = 20;

/**
 * Keeps answers for the page that is asked for next: a browser that showed progress comes back for its answer, and is not made to wait
 * again. Another process does not have it and finds it anew.
 */
export class Handover<Answer> {
  readonly #kept = new Map<string, { answer: Answer; untilMs: number }>();

  handOver(key: string, answer: Answer): void {
    for (const [other, { untilMs }] of this.#kept) {
      if (untilMs < Date.now() || this.#kept.size >= MOST_KEPT) this.#kept.delete(other);
    }
    this.#kept.set(key, { answer, untilMs: Date.now() + KEEP_MS });
  }

  /** The answer that was handed over under a key, once. */
  takeOver(key: string): Answer | null {
    const found = this.#kept.get(key);
    this.#kept.delete(key);
    return found && found.untilMs >= Date.now() ? found.answer : null;
  }
}
