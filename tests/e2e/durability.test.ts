import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { expect, inject, test } from 'vitest';
import { signedInFetch } from './support/signedInFetch';

const FIRST_START_SEC = Date.parse('2026-02-01T00:00:00Z') / 1000;
const SENDERS = 4;
const BATCH = 20;
const BANDS_HZ = [63, 125, 250, 500, 1000, 2000, 4000, 8000];

/** A level that tells which interval it belongs to, so that a mixed-up row is noticed. */
const levelOf = (startSec: number) => 30 + ((startSec / 60) % 500) / 10;

test(
  'every acknowledged interval survives kill -9 of web, worker and database, once',
  { timeout: 180_000 },
  async () => {
    const api = await signedInFetch('operator@merrow.example');
    const token = await registerStation(api, 'MER-90');
    const acknowledged = new Set<number>();
    const end = new AbortController();
    const senders = Array.from({ length: SENDERS }, (_, lane) => post(token, lane, acknowledged, end.signal));

    for (const victim of ['run/web.pid', 'mariadb/pid', 'run/worker.pid', 'mariadb/pid', 'run/web.pid']) {
      await sleep(1500);
      const before = acknowledged.size;
      process.kill(pidIn(victim), 'SIGKILL');
      await untilMore(acknowledged, before + SENDERS * BATCH);
    }
    end.abort();
    await Promise.all(senders);

    const stored = await readAll(await signedInFetch('operator@merrow.example'), 'MER-90');
    const starts = stored.map(({ start }) => Date.parse(start) / 1000);
    expect(new Set(starts).size).toBe(starts.length);
    expect([...acknowledged].filter((startSec) => !starts.includes(startSec))).toEqual([]);
    for (const { start, LAeq } of stored) expect(LAeq).toBeCloseTo(levelOf(Date.parse(start) / 1000), 5);
  },
);

type Api = (method: string, path: string, body?: unknown) => Promise<Response>;

async function registerStation(api: Api, code: string): Promise<string> {
  const response = await api('POST', '/api/v1/networks/merrow/stations', {
    code,
    name: 'Durability bench',
    latitude: 54.1,
    longitude: 1.6,
    bandFraction: 1,
    intervalSeconds: 60,
    firstBandHz: 63,
    lastBandHz: 8000,
  });
  expect(response.status).toBe(201);
  return ((await response.json()) as { token: string }).token;
}

/** Posts batch after batch, each again until it is acknowledged, as a monitor does. */
async function post(
  token: string,
  lane: number,
  acknowledged: Set<number>,
  signal: AbortSignal,
): Promise<void> {
  for (let batch = 0; !signal.aborted; batch += 1) {
    const firstSec = FIRST_START_SEC + (batch * SENDERS + lane) * BATCH * 60;
    const starts = Array.from({ length: BATCH }, (_, at) => firstSec + at * 60);
    while (!signal.aborted && !(await postOnce(token, starts))) await sleep(100);
    if (!signal.aborted) starts.forEach((startSec) => acknowledged.add(startSec));
  }
}

async function postOnce(token: string, starts: number[]): Promise<boolean> {
  const intervals = starts.map((startSec) => ({
    start: new Date(startSec * 1000).toISOString(),
    seconds: 60,
    LAeq: levelOf(startSec),
    levels: BANDS_HZ.map(() => levelOf(startSec)),
  }));
  try {
    const response = await fetch(`${inject('origin')}/api/v1/intervals`, {
      method: 'POST',
      headers: { Authorization: `Bearer ${token}`, 'Content-Type': 'application/json' },
      body: JSON.stringify({ bands: BANDS_HZ, intervals }),
      signal: AbortSignal.timeout(15_000),
    });
    if (!response.ok) {
      expect([429, 503]).toContain(response.status);
      return false;
    }
    const answer = (await response.json()) as { accepted: number; known: number; refused: unknown[] };
    expect(answer.refused).toEqual([]);
    expect(answer.accepted + answer.known).toBe(starts.length);
    return true;
  } catch (error) {
    if (error instanceof TypeError || (error instanceof Error && error.name === 'TimeoutError')) return false;
    throw error;
  }
}

function pidIn(file: string): number {
  return Number(readFileSync(join(inject('dataDirectory'), file), 'utf8'));
}

async function untilMore(acknowledged: Set<number>, count: number): Promise<void> {
  const deadline = Date.now() + 40_000;
  while (acknowledged.size < count) {
    expect(Date.now(), 'posting resumed in time').toBeLessThan(deadline);
    await sleep(100);
  }
}

async function readAll(api: Api, code: string): Promise<{ start: string; LAeq: number }[]> {
  const items: { start: string; LAeq: number }[] = [];
  const period = 'from=2026-02-01T00:00:00Z&to=2026-12-01T00:00:00Z&limit=10000';
  let cursor: string | null = '';
  while (cursor !== null) {
    const next: string = cursor === '' ? '' : `&cursor=${cursor}`;
    const response = await api('GET', `/api/v1/networks/merrow/stations/${code}/intervals?${period}${next}`);
    expect(response.status).toBe(200);
    const page = (await response.json()) as { items: { start: string; LAeq: number }[]; next: string | null };
    items.push(...page.items);
    cursor = page.next;
  }
  return items;
}
