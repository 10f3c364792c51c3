import { bandRange } from '#lib/acoustics/bands';
import { receiveBatch } from '#ingest/receive/receive';
import { makeRecorder, type IntervalRecord } from '#ingest/monitor/soundscape/record';
import { SOUNDSCAPES } from '#ingest/monitor/soundscape/places';
import { setupOf, type DemoStation } from './stations';

const DAY_SEC = 86_400;

/** What a monitor posted that could not be taken. */
interface Refused {
  code: string;
  daysAgo: number;
  /** How many intervals, one after the other. */
  count: number;
  /** Makes of a good record the one that was posted. */
  spoil: (record: IntervalRecord) => unknown;
}

/** A record whose time was written by a clock that runs ahead. */
function laterBy(record: IntervalRecord, sec: number): IntervalRecord {
  return { ...record, start: new Date(Date.parse(record.start) + sec * 1000).toISOString() };
}

const REFUSED: Refused[] = [
  // After a restart the monitor sent minutes once more, with levels that differ from what it had sent before.
  { code: 'MER-02', daysAgo: 5, count: 4, spoil: (record) => ({ ...record, LAeq: record.LAeq + 1.7 }) },
  { code: 'MER-06', daysAgo: 8, count: 3, spoil: (record) => laterBy(record, 2400) },
  // A broken cable reads as a level that no microphone has.
  { code: 'MER-05', daysAgo: 11, count: 2, spoil: (record) => ({ ...record, LAeq: 261.4 }) },
  { code: 'MER-01', daysAgo: 3, count: 1, spoil: ({ start, LAeq }) => ({ start, LAeq }) },
];

/** Posts what must be refused, and answers how many records are kept in quarantine by it. */
export async function seedQuarantine(
  stations: DemoStation[],
  nowSec: number,
  historyDays: number,
): Promise<number> {
  let kept = 0;
  for (const refused of REFUSED) {
    const demoStation = stations.find(({ site }) => site.code === refused.code);
    if (!demoStation) throw new Error(`${refused.code} is not among the demo's stations.`);
    const daysAgo = Math.min(refused.daysAgo, historyDays / 2);
    kept += await postRefused(demoStation, refused, Math.floor((nowSec - daysAgo * DAY_SEC) / 60) * 60);
  }
  return kept;
}

async function postRefused(
  { site, station }: DemoStation,
  { count, spoil }: Refused,
  fromSec: number,
): Promise<number> {
  const soundscape = SOUNDSCAPES.find(({ code }) => code === site.code);
  if (!soundscape) throw new Error(`${site.code} has no soundscape.`);
  const setup = setupOf(site);
  const record = makeRecorder(soundscape, setup);
  const bandsHz = bandRange(setup.bandFraction, setup.firstBandHz, setup.lastBandHz);
  const starts = Array.from({ length: count }, (_, at) => fromSec + at * setup.intervalSec);
  const envelope = {
    bands: bandsHz.map(({ nominalHz }) => nominalHz),
    bandIndices: { indices: bandsHz.map(({ index }) => index) },
    intervals: starts.map((startSec) => spoil(record(startSec))),
  };
  const postedAt = new Date((fromSec + (count + 1) * setup.intervalSec) * 1000);
  const { accepted, refused } = await receiveBatch(station, envelope, postedAt);
  if (accepted > 0) throw new Error(`${site.code}: ${accepted} intervals were taken that should not.`);
  return refused.filter(({ quarantined }) => quarantined).length;
}
