import { setTimeout as sleep } from 'node:timers/promises';
import { formatInstantUtc } from '#lib/contracts/common';

const FIRST_SEC = Date.parse('2025-06-01T00:00:00Z') / 1000;
const A_POST = 5;
const PACE_MS = 100;
const GIVEN_UP_AFTER_MS = 15_000;

/** Monitors that post minute after minute, each until it was told that all is stored; what was acknowledged is remembered. */
export class Posting {
  /** Starts that were acknowledged, by token. */
  readonly acknowledged = new Map<string, number[]>();
  /** Answers other than “stored”, and how often each came. */
  readonly otherwise = new Map<string, number>();
  readonly #answeredMs: number[] = [];
  readonly #answeredMsOf = new Map<string, number[]>();
  #isOver = false;
  readonly #senders: Promise<void>[];

  constructor(
    private readonly origin: string,
    tokens: readonly string[],
  ) {
    this.#senders = tokens.map((token) => this.#post(token));
  }

  async stop(): Promise<void> {
    this.#isOver = true;
    await Promise.all(this.#senders);
  }

  /** The longest time without any answer “stored” since an instant of `performance.now()`. */
  longestGapMs(sinceMs: number): number {
    return longestGapMs(this.#answeredMs, sinceMs);
  }

  /** The same of each monitor by itself, and of these the longest. */
  longestGapOfOneMs(sinceMs: number): number {
    return Math.max(...[...this.#answeredMsOf.values()].map((answered) => longestGapMs(answered, sinceMs)));
  }

  /** Waits until so many more posts were acknowledged. @throws when it takes too long. */
  async untilMore(count: number, withinMs: number): Promise<void> {
    const wanted = this.#answeredMs.length + count;
    const deadline = performance.now() + withinMs;
    while (this.#answeredMs.length < wanted) {
      if (performance.now() > deadline)
        throw new Error(`Posts did not resume: ${JSON.stringify([...this.otherwise])}`);
      await sleep(50);
    }
  }

  async #post(token: string): Promise<void> {
    const acknowledged: number[] = [];
    this.acknowledged.set(token, acknowledged);
    const answeredMs: number[] = [];
    this.#answeredMsOf.set(token, answeredMs);
    for (let next = FIRST_SEC; !this.#isOver;) {
      const starts = Array.from({ length: A_POST }, (_, at) => next + 60 * at);
      const told = await this.#send(token, starts);
      if (told === null) {
        acknowledged.push(...starts);
        this.#answeredMs.push(performance.now());
        answeredMs.push(performance.now());
        next += 60 * A_POST;
      } else this.otherwise.set(told, (this.otherwise.get(told) ?? 0) + 1);
      await sleep(PACE_MS);
    }
  }

  /** @returns null when all of it is stored, by this post or one before. */
  async #send(token: string, starts: readonly number[]): Promise<string | null> {
    const intervals = starts.map((startSec) => ({
      start: formatInstantUtc(startSec),
      seconds: 60,
      LAeq: 50 + (startSec % 7),
      levels: [40, 41, 42],
    }));
    try {
      const response = await fetch(`${this.origin}/api/v1/intervals`, {
        method: 'POST',
        headers: { authorization: `Bearer ${token}`, 'content-type': 'application/json' },
        body: JSON.stringify({ bands: [500, 1000, 2000], intervals }),
        signal: AbortSignal.timeout(GIVEN_UP_AFTER_MS),
      });
      const text = await response.text();
      if (response.status !== 200) return String(response.status);
      const { accepted, known } = JSON.parse(text) as { accepted: number; known: number };
      return accepted + known === starts.length ? null : text.slice(0, 200);
    } catch (error) {
      return (error as Error).name;
    }
  }
}

function longestGapMs(answeredMs: readonly number[], sinceMs: number): number {
  const marks = [sinceMs, ...answeredMs.filter((atMs) => atMs >= sinceMs), performance.now()];
  return Math.max(...marks.slice(1).map((atMs, at) => atMs - (marks[at] ?? atMs)));
}
