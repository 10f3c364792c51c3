import type { Knex } from 'knex';
import { bandSetOf, type BandSet } from '#db/queries/bandSets';
import { inTransaction } from '#db/queries/connection';
import { insertDirtyMarks } from '#db/queries/dirtyMarks';
import { insertIntervals, selectIntervals, type StoredInterval } from '#db/queries/intervals';
import { insertQuarantined } from '#db/queries/quarantine';
import { noteLatest } from '#db/queries/stationLatest';
import type { StationRow } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import type { Receipt } from '#lib/contracts/intervals';
import { quartersTouching } from '#lib/time/quarters';
import { findDifference } from './compare';
import type { Envelope } from './envelope';
import { Occupied } from './occupied';
import { parseRecord, Refusal, storedFlags, type ParsedInterval } from './parseRecord';

/** How far ahead of the server's clock an interval may end. */
export const MOST_AHEAD_SEC = 300;

type ReceivingStation = Pick<StationRow, 'id' | 'bandFraction' | 'acceptsFromSec'>;

interface Candidate {
  index: number;
  interval: ParsedInterval;
}

interface Refused {
  index: number;
  refusal: Refusal;
  startSec: number | null;
}

interface Decision {
  accepted: StoredInterval[];
  knownCount: number;
  refused: Refused[];
}

/**
 * Takes a post of a station: each record is accepted, known already, or refused with a reason and kept in quarantine. When the
 * promise resolves everything accepted and every refused record is durable, with marks for what must be recomputed.
 */
export async function receiveBatch(
  station: ReceivingStation,
  envelope: Envelope,
  now: Date,
): Promise<Receipt> {
  const bandSet =
    'indices' in envelope.bandIndices
      ? await bandSetOf(station.bandFraction, envelope.bandIndices.indices)
      : null;
  const read = readRecords(station, envelope, bandSet, now.getTime() / 1000);
  const decision = await inTransaction(async (transaction) => {
    const decided = await decide(station, read.candidates, bandSet, now, transaction);
    const refused = [...read.refused, ...decided.refused].sort((a, b) => a.index - b.index);
    await store(station, { ...decided, refused }, envelope, now, transaction);
    return { ...decided, refused };
  });
  return {
    accepted: decision.accepted.length,
    known: decision.knownCount,
    refused: decision.refused.map(({ index, refusal }) => ({
      index,
      code: refusal.code,
      detail: refusal.detail,
      quarantined: true,
    })),
    serverTime: now.toISOString(),
  };
}

/** What can be said of each record by itself. */
function readRecords(station: ReceivingStation, envelope: Envelope, bandSet: BandSet | null, nowSec: number) {
  const candidates: Candidate[] = [];
  const refused: Refused[] = [];
  envelope.intervals.forEach((record, index) => {
    try {
      if (!bandSet) throw new Refusal('unknown-band', bandProblem(envelope));
      const interval = parseRecord(record, bandSet);
      requireTimely(interval, station, nowSec);
      candidates.push({ index, interval });
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      refused.push({ index, refusal: error, startSec: null });
    }
  });
  return { candidates, refused };
}

function bandProblem({ bandIndices }: Envelope): string {
  return 'problem' in bandIndices ? bandIndices.problem : 'The bands cannot be read.';
}

function requireTimely(interval: ParsedInterval, { acceptsFromSec }: ReceivingStation, nowSec: number): void {
  const aheadSec = Math.round(interval.startSec + interval.durationSec - nowSec);
  if (aheadSec > MOST_AHEAD_SEC) {
    throw new Refusal(
      'clock-ahead',
      `The interval ends ${aheadSec} s after the server's time; the monitor's clock is ahead.`,
    );
  }
  if (acceptsFromSec !== null && interval.startSec < acceptsFromSec) {
    throw new Refusal('too-old', `The station takes intervals from ${formatInstantUtc(acceptsFromSec)} on.`);
  }
}

/** Compares candidates with what is stored and with one another, in the order of the post, under the station's lock. */
async function decide(
  station: ReceivingStation,
  candidates: Candidate[],
  bandSet: BandSet | null,
  now: Date,
  transaction: Knex.Transaction,
): Promise<Decision> {
  const decision: Decision = { accepted: [], knownCount: 0, refused: [] };
  if (candidates.length === 0 || !bandSet) return decision;
  await transaction('stations').where({ id: station.id }).forUpdate().first('id');
  const known = new Map<number, StoredInterval>();
  const occupied = new Occupied();
  for (const stored of await storedAround(station.id, candidates, transaction)) note(stored, known, occupied);
  for (const candidate of candidates) {
    const { index, interval } = candidate;
    const { startSec } = interval;
    const same = known.get(startSec);
    const difference = same && findDifference(interval, bandSet.indices, same);
    if (same && difference === null) {
      decision.knownCount += 1;
    } else if (same) {
      const detail = `Another interval with this start is stored; \`${difference}\` differs. The stored one stays.`;
      decision.refused.push({ index, startSec, refusal: new Refusal('conflict', detail) });
    } else if (occupied.overlaps(startSec, startSec + interval.durationSec)) {
      const detail = 'The interval overlaps another one that is stored.';
      decision.refused.push({ index, startSec, refusal: new Refusal('overlap', detail) });
    } else {
      const accepted = asStored(interval, bandSet, now);
      note(accepted, known, occupied);
      decision.accepted.push(accepted);
    }
  }
  return decision;
}

function note(interval: StoredInterval, known: Map<number, StoredInterval>, occupied: Occupied): void {
  known.set(interval.startSec, interval);
  occupied.add(interval.startSec, interval.startSec + interval.durationSec);
}

/** Longest stretch read at once; a post that strays over years is looked up piece by piece. */
const STRETCH_SEC = 86_400;

async function storedAround(
  stationId: number,
  candidates: Candidate[],
  transaction: Knex.Transaction,
): Promise<StoredInterval[]> {
  const spans = candidates
    .map(({ interval }) => ({ fromSec: interval.startSec, toSec: interval.startSec + interval.durationSec }))
    .sort((a, b) => a.fromSec - b.fromSec);
  const stored = new Map<number, StoredInterval>();
  for (let at = 0; at < spans.length;) {
    const first = spans[at]?.fromSec ?? 0;
    let toSec = first;
    for (; at < spans.length && (spans[at]?.fromSec ?? 0) < first + STRETCH_SEC; at += 1) {
      toSec = Math.max(toSec, spans[at]?.toSec ?? 0);
    }
    for (const interval of await selectIntervals(stationId, first, toSec, transaction))
      stored.set(interval.startSec, interval);
  }
  return [...stored.values()].sort((a, b) => a.startSec - b.startSec);
}

function asStored(interval: ParsedInterval, bandSet: BandSet, now: Date): StoredInterval {
  return {
    startSec: interval.startSec,
    durationSec: interval.durationSec,
    laeqCentiDb: interval.laeqCentiDb,
    lafmaxCentiDb: interval.lafmaxCentiDb,
    lafminCentiDb: interval.lafminCentiDb,
    lceqCentiDb: interval.lceqCentiDb,
    lcpeakCentiDb: interval.lcpeakCentiDb,
    levelsCentiDb: interval.levelsCentiDb,
    windSpeedMs: interval.windSpeedMs,
    windDirectionDeg: interval.windDirectionDeg,
    temperatureC: interval.temperatureC,
    batteryV: interval.batteryV,
    flags: storedFlags(interval),
    bandSetId: bandSet.id,
    bandFraction: bandSet.fraction,
    bandIndices: bandSet.indices,
    receivedAtSec: Math.floor(now.getTime() / 1000),
  };
}

async function store(
  station: ReceivingStation,
  { accepted, refused }: Decision,
  { bands, intervals }: Envelope,
  now: Date,
  transaction: Knex.Transaction,
): Promise<void> {
  const quarantined = refused.map(({ index, refusal, startSec }) => ({
    code: refusal.code,
    detail: refusal.detail,
    record: JSON.stringify({ bands, interval: intervals[index] ?? null }),
    startSec,
  }));
  await insertQuarantined(station.id, quarantined, now, transaction);
  const newest = newestOf(accepted);
  if (!newest) return;
  await insertIntervals(station.id, accepted, transaction);
  await insertDirtyMarks(station.id, touchedQuarters(accepted), transaction);
  await noteLatest({ ...newest, stationId: station.id, receivedAt: now }, transaction);
}

function newestOf(intervals: readonly StoredInterval[]): StoredInterval | undefined {
  return intervals.reduce<StoredInterval | undefined>(
    (newest, interval) => (newest && newest.startSec > interval.startSec ? newest : interval),
    undefined,
  );
}

function touchedQuarters(intervals: readonly StoredInterval[]): Set<number> {
  const quarters = new Set<number>();
  for (const { startSec, durationSec } of intervals) {
    for (const quarter of quartersTouching(startSec, startSec + durationSec)) quarters.add(quarter);
  }
  return quarters;
}
