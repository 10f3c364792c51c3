import { type SpectrumSearchAnswer } from '#lib/contracts/spectrumSearch';

/** Long enough to come back for it at once; what was found is older than the page by no more. */
const KEEP_MS = 15_000;
const MOST_KEPT = 20;

const kept = new Map<string, { answer: SpectrumSearchAnswer; untilMs: number }>();

/**
 * Keeps an answer for the page that is asked for next: a browser that showed progress comes back for it, and is not made to search
 * again. Another process does not have it and searches.
 */
export function handOver(key: string, answer: SpectrumSearchAnswer): void {
  for (const [other, { untilMs }] of kept) {
    if (untilMs < Date.now() || kept.size >= MOST_KEPT) kept.delete(other);
  }
  kept.set(key, { answer, untilMs: Date.now() + KEEP_MS });
}

/** The answer that was handed over under a key, once. */
export function takeOver(key: string): SpectrumSearchAnswer | null {
  const found = kept.get(key);
  kept.delete(key);
  return found && found.untilMs >= Date.now() ? found.answer : null;
}
