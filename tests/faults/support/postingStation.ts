import { setTimeout as sleep } from 'node:timers/promises';
import { expect } from 'vitest';
import { db } from '#db/client';
import { callApi } from '../../integration/support/callApi';

const BANDS_HZ = [
  12.5, 16, 20, 25, 31.5, 40, 50, 63, 80, 100, 125, 160, 200, 250, 315, 400, 500, 630, 800, 1000, 1250, 1600,
  2000, 2500, 3150, 4000, 5000, 6300, 8000, 10000, 12500, 16000, 20000,
];

export interface Batch {
  startsSec: number[];
  body: unknown;
}

/** A station that posts batch after batch, and remembers what was acknowledged. */
export class PostingStation {
  readonly #acknowledged: number[] = [];
  #nextMinute = 0;

  constructor(
    readonly stationId: number,
    private readonly token: string,
  ) {}

  nextBatch(count: number): Batch {
    const startsSec = Array.from(
      { length: count },
      (_, at) => Date.UTC(2025, 0, 1) / 1000 + (this.#nextMinute + at) * 60,
    );
    this.#nextMinute += count;
    const levels = BANDS_HZ.map((_, band) => 30 + (band % 7));
    const intervals = startsSec.map((startSec) => ({
      start: new Date(startSec * 1000).toISOString(),
      seconds: 60,
      LAeq: 52.3,
      levels,
    }));
    return { startsSec, body: { bands: BANDS_HZ, intervals } };
  }

  /** Posts once. @returns whether it was acknowledged; anything but that and "come again" fails the test. */
  async post({ startsSec, body }: Batch): Promise<boolean> {
    const response = await callApi('POST', '/api/v1/intervals', { token: this.token, body });
    if (response.status === 503) {
      expect(Number(response.headers.get('retry-after'))).toBeGreaterThan(0);
      return false;
    }
    expect(response.status).toBe(200);
    const answer = (await response.json()) as { accepted: number; known: number };
    expect(answer.accepted + answer.known).toBe(startsSec.length);
    this.#acknowledged.push(...startsSec);
    return true;
  }

  /** @returns how often it was told to come again. */
  async postUntilTaken(batch: Batch): Promise<number> {
    for (let refusals = 0; ; refusals += 1) {
      if (await this.post(batch)) return refusals;
      await sleep(200);
    }
  }

  async expectNothingLost(): Promise<void> {
    const stored = new Set<number>(
      await db()('interval_levels').where({ station_id: this.stationId }).pluck('starts_at'),
    );
    expect(this.#acknowledged.filter((startSec) => !stored.has(startSec))).toEqual([]);
    expect(stored.size).toBe(this.#acknowledged.length);
  }
}
