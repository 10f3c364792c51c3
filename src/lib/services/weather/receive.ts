import { inTransaction, type Connection } from '#db/queries/connection';
import { lockMast } from '#db/queries/masts';
import { insertRefusedWeather } from '#db/queries/weatherQuarantine';
import { insertWeather, selectWeather, type StoredWeather } from '#db/queries/weatherRecords';
import { firstRecordEndingAfter, type WeatherRecord } from '#lib/acoustics/mastWeather';
import { parseInstant } from '#lib/contracts/common';
import { type Receipt, type RefusalCode } from '#lib/contracts/intervals';
import { weatherRecordSchema } from '#lib/contracts/weather';
import { keptWeather } from './keptWeather';
import { markStationsOf, spansSpokenOf } from './touched';

/** A clock this far ahead is believed. */
const AHEAD_SEC = 300;

/** Why a record is not taken, by its place among those given. */
export interface RefusedRecord {
  index: number;
  code: RefusalCode;
  detail: string;
}

interface Sorted {
  accepted: StoredWeather[];
  known: number;
  refused: RefusedRecord[];
  /** What is stored, and the accepted ones, ascending. */
  all: StoredWeather[];
}

/** A mast, as far as taking its records goes. */
export interface ReceivingMast {
  id: number;
  maximumAgeSec: number;
}

/**
 * Takes records of a mast: each is accepted, known already, or refused with a reason and kept. When the promise resolves everything
 * accepted and every record kept is durable, with marks for every quarter-hour of the stations whose figures it may decide. `isTrial`:
 * tells what would become of them and stores nothing.
 */
export async function receiveWeather(
  mast: ReceivingMast,
  records: readonly unknown[],
  now: Date,
  isTrial = false,
): Promise<Receipt> {
  const taken = await inTransaction(
    async (transaction) => {
      const found = await takeRecords(mast, records, now, transaction, isTrial);
      const refused = found.refused.map((one) => ({ ...one, kept: keptWeather(one, records[one.index]) }));
      const kept = refused.flatMap((one) => one.kept ?? []);
      if (!isTrial) await insertRefusedWeather(mast.id, kept, now, transaction);
      return { ...found, refused };
    },
    // Reads after a lock must see all that was committed before it was granted.
    { isolationLevel: 'read committed' },
  );
  return {
    accepted: taken.accepted,
    known: taken.known,
    refused: taken.refused.map(({ index, code, detail, kept }) => ({
      index,
      code,
      detail,
      quarantined: kept !== null && !isTrial,
    })),
    serverTime: now.toISOString(),
  };
}

/** What became of some records. */
export interface TakenWeather {
  accepted: number;
  known: number;
  /** By their places, ascending. */
  refused: RefusedRecord[];
}

/** Takes records in a read-committed transaction, with the mast locked, keeping none of the refused ones; `isTrial`: stores nothing. */
export async function takeRecords(
  mast: ReceivingMast,
  records: readonly unknown[],
  now: Date,
  transaction: Connection,
  isTrial = false,
): Promise<TakenWeather> {
  const nowSec = now.getTime() / 1000;
  const read = readAll(records, nowSec);
  const [earliest] = [...read.records].sort((a, b) => a.record.startSec - b.record.startSec);
  if (!earliest) return { accepted: 0, known: 0, refused: read.refused };
  const latestSec = Math.max(...read.records.map(({ record }) => record.startSec + record.durationSec));
  await lockMast(mast.id, transaction);
  const fromSec = earliest.record.startSec;
  const stored = await selectWeather(mast.id, fromSec, latestSec, mast.maximumAgeSec, transaction);
  const found = sort(read.records, stored);
  if (!isTrial) {
    await insertWeather(mast.id, found.accepted, Math.floor(nowSec), transaction);
    const fresh = new Set<WeatherRecord>(found.accepted);
    const spans = spansSpokenOf(found.all, (record) => fresh.has(record), mast.maximumAgeSec);
    await markStationsOf(mast.id, spans, transaction);
  }
  const refused = [...read.refused, ...found.refused].sort((a, b) => a.index - b.index);
  return { accepted: found.accepted.length, known: found.known, refused };
}

function readAll(
  records: readonly unknown[],
  nowSec: number,
): { records: { index: number; record: StoredWeather }[]; refused: RefusedRecord[] } {
  const read: ReturnType<typeof readAll> = { records: [], refused: [] };
  for (const [index, value] of records.entries()) {
    const parsed = weatherRecordSchema.safeParse(value);
    if (!parsed.success) {
      const [issue] = parsed.error.issues;
      const isOutside = issue?.code === 'too_big' || issue?.code === 'too_small';
      const detail = `\`${String(issue?.path[0] ?? 'record')}\` ${issue?.message ?? 'is wrong'}.`;
      read.refused.push({ index, code: isOutside ? 'out-of-range' : 'malformed', detail });
      continue;
    }
    const record = storedOf(parsed.data);
    if (record.startSec < 0 || record.startSec + record.durationSec > nowSec + AHEAD_SEC) {
      const detail = 'The record ends more than 5 minutes ahead of the server’s clock, or lies before 1970.';
      read.refused.push({ index, code: record.startSec < 0 ? 'out-of-range' : 'clock-ahead', detail });
    } else {
      read.records.push({ index, record });
    }
  }
  return read;
}

function storedOf(record: ReturnType<typeof weatherRecordSchema.parse>): StoredWeather {
  const { start, seconds, windSpeed, windDirection, rain, temperature } = record;
  const hundredths = (value: number | null | undefined) =>
    typeof value === 'number' ? Math.round(value * 100) / 100 : null;
  return {
    startSec: parseInstant(start) ?? 0,
    durationSec: seconds,
    windSpeedMs: Math.round(windSpeed * 100) / 100,
    windDirectionDeg: typeof windDirection === 'number' ? Math.round(windDirection) % 360 : null,
    rainMm: hundredths(rain),
    temperatureC: hundredths(temperature),
  };
}

/** Compares records with what is stored and, in the order of their post, with one another. */
function sort(records: readonly { index: number; record: StoredWeather }[], stored: StoredWeather[]): Sorted {
  const sorted: Sorted = { accepted: [], known: 0, refused: [], all: [...stored] };
  for (const { index, record } of records) {
    const at = firstRecordEndingAfter(sorted.all, record.startSec);
    const there = sorted.all[at];
    if (!there || there.startSec >= record.startSec + record.durationSec) {
      sorted.all.splice(at, 0, record);
      sorted.accepted.push(record);
    } else if (there.startSec !== record.startSec) {
      const detail = 'The record overlaps another one that is stored.';
      sorted.refused.push({ index, code: 'overlap', detail });
    } else if (isSame(record, there)) {
      sorted.known += 1;
    } else {
      const detail = 'Another record with this start is stored and differs. The stored one stays.';
      sorted.refused.push({ index, code: 'conflict', detail });
    }
  }
  return sorted;
}

/** Fields left out are not compared, as with intervals. */
function isSame(record: StoredWeather, there: StoredWeather): boolean {
  const { windDirectionDeg, rainMm, temperatureC } = record;
  return (
    record.durationSec === there.durationSec &&
    record.windSpeedMs === there.windSpeedMs &&
    (windDirectionDeg === null || windDirectionDeg === there.windDirectionDeg) &&
    (rainMm === null || rainMm === there.rainMm) &&
    (temperatureC === null || temperatureC === there.temperatureC)
  );
}
