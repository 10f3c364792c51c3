import { setTimeout as sleep } from 'node:timers/promises';
import { promisify } from 'node:util';
import { gzip } from 'node:zlib';
import { BANDS_HZ, type Given } from './records';

const compress = promisify(gzip);
const MOST_RECORDS_A_POST = 60;
const FIRST_WAIT_MS = 250;
const LONGEST_WAIT_MS = 8_000;
const ANSWER_TIMEOUT_MS = 30_000;
/** Answers that ask a monitor to come again. */
const LATER = new Set([429, 503]);

/** How often each answer came, and answers that no monitor should get. */
export class Answers {
  readonly counts = new Map<string, number>();
  readonly odd: string[] = [];

  count(what: string): void {
    this.counts.set(what, (this.counts.get(what) ?? 0) + 1);
  }

  note(what: string): void {
    if (this.odd.length < 20) this.odd.push(what);
    this.count('odd');
  }
}

export interface MonitorPlace {
  origin: string;
  token: string;
  /** From where it seems to post, as a proxy before Bittern would say. */
  address: string;
  given: readonly Given[];
  answers: Answers;
  /** Milliseconds from now at which a minute of the data is due. */
  dueInMs(minute: number): number;
}

/**
 * A monitor of the soak: sends what is due, oldest first, forgets it once it is answered for, and otherwise keeps it and tries again
 * after a while. Ends when everything is answered for, or `signal` aborts.
 */
export async function runSoakMonitor(place: MonitorPlace, signal: AbortSignal): Promise<void> {
  const waiting: unknown[] = [];
  let next = 0;
  let failures = 0;
  while (!signal.aborted) {
    for (let due = place.given[next]; due && place.dueInMs(due.minute) <= 0; due = place.given[next]) {
      if (due.isGarbled) await sendGarbled(place, signal);
      waiting.push(...due.records);
      next += 1;
    }
    const upcoming = place.given[next];
    if (waiting.length === 0) {
      if (!upcoming) return;
      await pause(place.dueInMs(upcoming.minute), signal);
      continue;
    }
    const batch = waiting.slice(0, MOST_RECORDS_A_POST);
    const waitMs = await send(batch, place, failures, signal);
    if (waitMs === null) waiting.splice(0, batch.length);
    failures = waitMs === null ? 0 : failures + 1;
    if (waitMs !== null) await pause(waitMs, signal);
  }
}

/** Posts a batch. @returns null once it is answered for, otherwise the milliseconds to wait. */
async function send(
  batch: unknown[],
  place: MonitorPlace,
  failures: number,
  signal: AbortSignal,
): Promise<number | null> {
  const backOffMs = Math.min(LONGEST_WAIT_MS, FIRST_WAIT_MS * 2 ** failures) * (0.75 + Math.random() / 2);
  try {
    const body = await compress(JSON.stringify({ bands: BANDS_HZ, intervals: batch }));
    const response = await post(place, body, signal);
    const text = await response.text();
    if (response.status === 200) return accountFor(text, batch.length, place.answers);
    if (!LATER.has(response.status)) {
      place.answers.note(`${response.status} ${text.slice(0, 300)}`);
      return backOffMs;
    }
    place.answers.count(String(response.status));
    const retryAfter = response.headers.get('retry-after');
    if (retryAfter === null) place.answers.note(`${response.status} without Retry-After`);
    return Math.max(backOffMs, Math.min(LONGEST_WAIT_MS, Number(retryAfter) * 1000));
  } catch {
    if (!signal.aborted) place.answers.count('no answer');
    return backOffMs;
  }
}

function accountFor(text: string, count: number, answers: Answers): null {
  const { accepted, known, refused } = JSON.parse(text) as {
    accepted: number;
    known: number;
    refused: unknown[];
  };
  answers.count('200');
  if (accepted + known + refused.length !== count) answers.note(`of ${count} records: ${text.slice(0, 200)}`);
  return null;
}

/** A post that breaks off half-way through its gzip data, or is no JSON: it must be refused as a whole, and is not sent again. */
async function sendGarbled(place: MonitorPlace, signal: AbortSignal): Promise<void> {
  const whole = await compress('{"bands": [100, 125], "intervals": [{"start":');
  const body = place.given.length % 2 === 0 ? whole : whole.subarray(0, whole.length / 2);
  const status = await post(place, body, signal).then(
    async (response) => {
      await response.arrayBuffer();
      return response.status;
    },
    () => null,
  );
  if (status === 422) place.answers.count('422');
  else if (status !== null && !LATER.has(status)) place.answers.note(`${status} for a garbled post`);
}

function post(
  { origin, token, address }: MonitorPlace,
  body: Uint8Array<ArrayBuffer>,
  signal: AbortSignal,
): Promise<Response> {
  return fetch(`${origin}/api/v1/intervals`, {
    method: 'POST',
    headers: {
      authorization: `Bearer ${token}`,
      'x-forwarded-for': address,
      'content-type': 'application/json',
      'content-encoding': 'gzip',
    },
    body,
    signal: AbortSignal.any([signal, AbortSignal.timeout(ANSWER_TIMEOUT_MS)]),
  });
}

async function pause(ms: number, signal: AbortSignal): Promise<void> {
  await sleep(Math.max(0, ms), undefined, { signal }).catch(() => undefined);
}
