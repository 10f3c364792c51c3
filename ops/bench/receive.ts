import { gzipSync } from 'node:zlib';
import { inTransaction } from '#db/queries/connection';
import { insertIntervals, type NewInterval } from '#db/queries/intervals';
import { insertStationToken } from '#db/queries/stationTokens';
import { flagNames } from '#lib/acoustics/validity';
import { formatInstantUtc } from '#lib/contracts/common';
import { compare, digits, median, printTable } from './support/measure';
import { Receiver } from './support/receiver';
import { withOwnSchema } from './support/schema';
import { BANDS, invent, makeNetwork, makeStation } from './support/station';

/**
 * Intervals a second that are acknowledged, over loopback HTTP, against inserting the same rows in the same transactions
 * alone. One monitor at a time, which waits for each answer.
 */
const FIRST_SEC = Date.parse('2026-01-01T00:00:00Z') / 1000;
const SIZES = [
  { perPost: 1, posts: 100, turns: 5 },
  { perPost: 60, posts: 20, turns: 5 },
  { perPost: 3000, posts: 1, turns: 7 },
];

await withOwnSchema(async () => {
  const networkId = await makeNetwork();
  const receiver = await Receiver.start();
  const rows: string[][] = [];
  for (const { perPost, posts, turns } of SIZES) {
    const posted = await makeStation(networkId, `POSTED-${perPost}`, 60);
    const raw = await makeStation(networkId, `RAW-${perPost}`, 60);
    const token = await inTransaction((transaction) => insertStationToken(posted.id, null, transaction));
    const batches = await batchesOf(perPost, posts, turns + 1);
    const bodies = batches.map((turn) => turn.map(bodyOf));
    const { ms, againstMs } = await compare(
      turns,
      async (turn) => {
        for (const body of bodies[turn + 1] ?? []) await receiver.post(token, body, perPost);
      },
      async (turn) => {
        for (const batch of batches[turn + 1] ?? []) {
          await inTransaction((transaction) => insertIntervals(raw.id, batch, transaction));
        }
      },
    );
    const count = perPost * posts * 1000;
    rows.push([
      digits(perPost),
      digits(median(ms) / median(againstMs)),
      digits(count / median(ms)),
      digits(count / median(againstMs)),
      digits(median(ms) / posts),
    ]);
  }
  receiver.stop();
  printTable(['intervals a post', 'time ÷ raw insert', 'acknowledged/s', 'raw insert/s', 'ms a post'], rows);
});

async function batchesOf(perPost: number, posts: number, turns: number): Promise<NewInterval[][][]> {
  const all = await invent(FIRST_SEC, perPost * posts * turns, 60);
  return Array.from({ length: turns }, (_, turn) =>
    Array.from({ length: posts }, (_post, post) => {
      const first = (turn * posts + post) * perPost;
      return all.slice(first, first + perPost);
    }),
  );
}

function bodyOf(intervals: readonly NewInterval[]): Uint8Array<ArrayBuffer> {
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
  return new Uint8Array(
    gzipSync(JSON.stringify({ bands: BANDS.map(({ nominalHz }) => nominalHz), intervals: records })),
  );
}
