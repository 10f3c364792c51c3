import { Agent, request } from 'node:http';
import { performance } from 'node:perf_hooks';
import { setTimeout as sleep } from 'node:timers/promises';
import { gzipSync } from 'node:zlib';
import { inTransaction } from '#db/queries/connection';
import type { NewInterval } from '#db/queries/intervals';
import { insertStationToken } from '#db/queries/stationTokens';
import { flagNames } from '#lib/acoustics/validity';
import { formatInstantUtc } from '#lib/contracts/common';
import { BANDS, makeStation } from './station';

/** A monitor of the bench: a station with a token. */
export interface Monitor {
  stationId: number;
  token: string;
}

/** One post: packed, and how many intervals are in it. */
export interface Post {
  body: Buffer;
  count: number;
}

const agent = new Agent({ keepAlive: true, maxSockets: 200 });

/** Adds stations with a token each. */
export async function makeMonitors(networkId: number, name: string, count: number): Promise<Monitor[]> {
  const monitors: Monitor[] = [];
  for (let at = 0; at < count; at += 1) {
    const { id } = await makeStation(networkId, `${name}-${at}`, 60);
    const token = await inTransaction((transaction) => insertStationToken(id, null, transaction));
    monitors.push({ stationId: id, token });
  }
  return monitors;
}

/** What a monitor sends for some intervals: JSON, packed by gzip. */
export function postOf(intervals: readonly NewInterval[]): Post {
  const dB = (centiDb: number | null) => (centiDb === null ? null : centiDb / 100);
  const records = intervals.map((interval) => ({
    start: formatInstantUtc(interval.startSec),
    seconds: interval.durationSec,
    LAeq: dB(interval.laeqCentiDb),
    LAFmax: dB(interval.lafmaxCentiDb),
    LAFmin: dB(interval.lafminCentiDb),
    LCeq: dB(interval.lceqCentiDb),
    levels: Array.from(interval.levelsCentiDb, dB),
    flags: flagNames(interval.flags),
    windSpeed: interval.windSpeedMs,
    windDirection: interval.windDirectionDeg,
    temperature: interval.temperatureC,
    battery: interval.batteryV,
  }));
  const text = JSON.stringify({ bands: BANDS.map(({ nominalHz }) => nominalHz), intervals: records });
  return { body: gzipSync(text), count: intervals.length };
}

/** Sends a post and waits for the answer, trying again where the server asks for it. @throws unless all of it is accepted. */
export async function send(origin: string, { token }: Monitor, { body, count }: Post): Promise<void> {
  for (;;) {
    const { status, text } = await sendOnce(origin, token, body);
    if (status === 200 && text.startsWith(`{"accepted":${count},`)) return;
    if (status !== 429 && status !== 503)
      throw new Error(`Not all were accepted: ${status} ${text.slice(0, 300)}`);
    await sleep(100);
  }
}

/** Sends posts from every monitor at once, each monitor's one after the other. */
export async function sendAll(origin: string, monitors: readonly Monitor[], posts: Post[][]): Promise<void> {
  await Promise.all(
    monitors.map(async (monitor, at) => {
      for (const post of posts[at] ?? []) await send(origin, monitor, post);
    }),
  );
}

/**
 * Sends one post of each monitor in turn at a steady pace, whether the one before has been answered or not.
 * @returns milliseconds from when each was due until it was answered.
 */
export async function sendAtPace(
  origin: string,
  monitors: readonly Monitor[],
  posts: Post[][],
  postsPerSec: number,
): Promise<number[]> {
  const startMs = performance.now() + 50;
  const turns = Math.max(...posts.map((own) => own.length));
  const answered: Promise<number>[] = [];
  for (let turn = 0; turn < turns; turn += 1) {
    for (const [at, monitor] of monitors.entries()) {
      const post = posts[at]?.[turn];
      if (!post) continue;
      const dueMs = startMs + (answered.length * 1000) / postsPerSec;
      const earlyMs = dueMs - performance.now();
      if (earlyMs > 1) await sleep(earlyMs);
      answered.push(send(origin, monitor, post).then(() => performance.now() - dueMs));
    }
  }
  return Promise.all(answered);
}

function sendOnce(origin: string, token: string, body: Buffer): Promise<{ status: number; text: string }> {
  return new Promise((answered, failed) => {
    const headers = {
      authorization: `Bearer ${token}`,
      'content-type': 'application/json',
      'content-encoding': 'gzip',
      'content-length': body.length,
    };
    const sending = request(`${origin}/api/v1/intervals`, { method: 'POST', agent, headers }, (response) => {
      const chunks: Buffer[] = [];
      response.on('data', (chunk: Buffer) => chunks.push(chunk));
      response.on('end', () =>
        answered({ status: response.statusCode ?? 0, text: Buffer.concat(chunks).toString('utf8') }),
      );
    });
    sending.on('error', failed);
    sending.end(body);
  });
}
