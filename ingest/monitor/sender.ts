import { promisify } from 'node:util';
import { gzip } from 'node:zlib';
import { setTimeout as sleep } from 'node:timers/promises';
import type { Spool } from './spool';

const compress = promisify(gzip);

export interface SenderSettings {
  /** Bittern's address, without a trailing slash. */
  serverUrl: string;
  token: string;
  bandsHz: number[];
  /** Most records a post; the contract allows 10,000. */
  batchSize: number;
}

/** What the server said of one post. */
export interface PostAnswer {
  accepted: number;
  known: number;
  refused: { index: number; code: string; detail: string }[];
}

export type SendOutcome =
  | { kind: 'sent'; answer: PostAnswer; count: number }
  | { kind: 'nothing' }
  | { kind: 'later'; waitSec: number; reason: string }
  | { kind: 'refused'; status: number; reason: string };

const FIRST_WAIT_SEC = 1;
const LONGEST_WAIT_SEC = 60;
const ANSWER_TIMEOUT_MS = 30_000;

/** Posts the oldest waiting records and forgets them once the server has answered for them. */
export class Sender {
  private failures = 0;
  private batchSize: number;

  constructor(
    private readonly spool: Spool,
    private readonly settings: SenderSettings,
  ) {
    this.batchSize = settings.batchSize;
  }

  /** One post. After `later` wait that long: Retry-After when the server named it, else longer from failure to failure. */
  async sendOnce(signal?: AbortSignal): Promise<SendOutcome> {
    const batch = this.spool.oldest(this.batchSize);
    if (batch.length === 0) return { kind: 'nothing' };
    try {
      const response = await this.post(
        batch.map(({ record }) => record),
        signal,
      );
      if (response.ok) return this.settle((await response.json()) as PostAnswer, batch.length);
      if (response.status === 429 || response.status >= 500) {
        return this.later(
          `HTTP ${response.status}`,
          Number(response.headers.get('retry-after') ?? Number.NaN),
        );
      }
      if (response.status === 413 && batch.length > 1) {
        this.batchSize = Math.ceil(batch.length / 2);
        return { kind: 'later', waitSec: 0, reason: 'HTTP 413: half as many at once from now on' };
      }
      return { kind: 'refused', status: response.status, reason: (await response.text()).slice(0, 500) };
    } catch (error) {
      return this.later(error instanceof Error ? error.message : String(error), Number.NaN);
    }
  }

  private async post(intervals: unknown[], signal: AbortSignal | undefined): Promise<Response> {
    const envelope = { bands: this.settings.bandsHz, sentAt: new Date().toISOString(), intervals };
    const timeout = AbortSignal.timeout(ANSWER_TIMEOUT_MS);
    return fetch(`${this.settings.serverUrl}/api/v1/intervals`, {
      method: 'POST',
      headers: {
        Authorization: `Bearer ${this.settings.token}`,
        'Content-Type': 'application/json',
        'Content-Encoding': 'gzip',
      },
      body: await compress(JSON.stringify(envelope)),
      signal: signal ? AbortSignal.any([signal, timeout]) : timeout,
    });
  }

  private settle(answer: PostAnswer, count: number): SendOutcome {
    this.failures = 0;
    this.spool.settle(count);
    return { kind: 'sent', answer, count };
  }

  private later(reason: string, retryAfterSec: number): SendOutcome {
    const backOffSec =
      Math.min(LONGEST_WAIT_SEC, FIRST_WAIT_SEC * 2 ** this.failures) * (0.75 + Math.random() / 2);
    this.failures += 1;
    return { kind: 'later', waitSec: Number.isFinite(retryAfterSec) ? retryAfterSec : backOffSec, reason };
  }
}

/** Instant (epoch seconds) of the last interval that the server has of this station, or null when it has none. */
export async function lastKnownStartSec(
  { serverUrl, token }: SenderSettings,
  signal: AbortSignal,
): Promise<number | null> {
  for (let attempt = 0; ; attempt += 1) {
    try {
      const response = await fetch(`${serverUrl}/api/v1/intervals/last`, {
        headers: { Authorization: `Bearer ${token}` },
        signal,
      });
      if (response.ok) {
        const { lastStart } = (await response.json()) as { lastStart: string | null };
        return lastStart === null ? null : Date.parse(lastStart) / 1000;
      }
      if (response.status === 401) throw new TokenRefused();
    } catch (error) {
      if (signal.aborted || error instanceof TokenRefused) throw error;
    }
    await sleep(Math.min(30, 2 ** attempt) * 1000, undefined, { signal });
  }
}

/** The token is not, or no longer, in force: a person has to hand out another. */
class TokenRefused extends Error {
  constructor() {
    super('The server does not know this station token.');
    this.name = 'TokenRefused';
  }
}
