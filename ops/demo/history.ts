import { bandRange } from '#lib/acoustics/bands';
import { receiveBatch } from '#ingest/receive/receive';
import { makeRecorder } from '#ingest/monitor/soundscape/record';
import { SOUNDSCAPES } from '#ingest/monitor/soundscape/places';
import { isInOutage } from './outages';
import { setupOf, type DemoStation } from './stations';

const DAY_SEC = 86_400;
/** Longest stretch of one post: what it brings is not late, and a 1-s station's post stays within the contract's bound. */
const BATCH_SEC = 3000;
/** A monitor's post arrives this long after its last interval's end. */
const POST_DELAY_SEC = 20;

/** Posts a station's past, as its monitor would have: in order, with its gaps; a kept-back stretch last and late. */
export async function seedHistory(
  { site, station }: DemoStation,
  historyDays: number,
  nowSec: number,
): Promise<number> {
  const soundscape = SOUNDSCAPES.find(({ code }) => code === site.code);
  if (!soundscape) throw new Error(`${site.code} has no soundscape.`);
  const setup = setupOf(site);
  const record = makeRecorder(soundscape, setup);
  const bandsHz = bandRange(setup.bandFraction, setup.firstBandHz, setup.lastBandHz);
  const indices = bandsHz.map(({ index }) => index);
  const bands = bandsHz.map(({ nominalHz }) => nominalHz);

  const post = async (starts: number[], receivedAtSec: number) => {
    const envelope = { bands, bandIndices: { indices }, intervals: starts.map(record) };
    const { accepted } = await receiveBatch(station, envelope, new Date(receivedAtSec * 1000));
    if (accepted !== starts.length)
      throw new Error(`${site.code}: ${starts.length - accepted} intervals were not taken.`);
    return accepted;
  };

  const { live, backfilled } = startsOf(
    site.code,
    setup.intervalSec,
    site.joinedDaysAgo ?? historyDays,
    nowSec,
  );
  let count = 0;
  for (const batch of batches(live, BATCH_SEC / setup.intervalSec))
    count += await post(batch, (batch.at(-1) ?? 0) + setup.intervalSec + POST_DELAY_SEC);
  for (const batch of batches(backfilled, BATCH_SEC)) count += await post(batch, nowSec - 2 * DAY_SEC);
  return count;
}

function startsOf(code: string, intervalSec: number, days: number, nowSec: number) {
  const live: number[] = [];
  const backfilled: number[] = [];
  const lastSec = Math.floor(nowSec / intervalSec) * intervalSec - intervalSec;
  for (
    let startSec = lastSec - Math.floor((days * DAY_SEC) / intervalSec) * intervalSec;
    startSec <= lastSec;
    startSec += intervalSec
  ) {
    const hoursAgo = (nowSec - startSec) / 3600;
    if (isInOutage(code, hoursAgo, false)) continue;
    (isInOutage(code, hoursAgo, true) ? backfilled : live).push(startSec);
  }
  return { live, backfilled };
}

function* batches(starts: number[], size: number): Generator<number[]> {
  for (let first = 0; first < starts.length; first += size) yield starts.slice(first, first + size);
}
