import { beforeEach } from 'vitest';
import { db } from '#db/client';
import { listJobTroubles } from '#db/queries/jobTroubles';
import { invent, storeMeasured, type Stretch } from '../../integration/levels/support/measured';
import { makeNetwork, makeStation } from '../../integration/support/people';

const DAY_SEC = 86_400;
const NO_SUCH_BANDS = 65_000;
const YESTERDAY_SEC = (Math.floor(Date.now() / 1000 / DAY_SEC) - 2) * DAY_SEC;
/** Four hours that are past. */
export const STRETCH: Stretch = {
  fromSec: YESTERDAY_SEC,
  toSec: YESTERDAY_SEC + 4 * 3600,
  intervalSec: 60,
  bands: [-16, 9],
  gaps: 0,
};

/** Nothing of one test is another's input. */
const EMPTIED = [
  'job_troubles',
  'dirty_marks',
  'pending_windows',
  'station_day_traces',
  'alert_items',
  'outbox',
  'webhooks',
  'networks',
  'network_settings',
  'stations',
  'interval_levels',
  'alert_preferences',
];

interface Place {
  networkId: number;
  stationId: number;
}

/** A place that is poisoned, and a sound one. */
export interface Places {
  bad: Place;
  sound: Place;
}

/** Makes both for each test; the poisoned network comes before the sound one in every list. */
export function useTwoPlaces(): Places {
  const none = { networkId: 0, stationId: 0 };
  const places = { bad: none, sound: none };
  let networks = 0;
  beforeEach(async () => {
    networks += 1;
    for (const table of EMPTIED) await db()(table).delete();
    places.bad = await place(`a-${networks}`);
    places.sound = await place(`b-${networks}`);
  });
  return places;
}

async function place(slug: string): Promise<Place> {
  const networkId = await makeNetwork(slug);
  return { networkId, stationId: await makeStation(networkId, 'ST-1') };
}

/** What jobs could not do. */
export const troubles = async () =>
  (await listJobTroubles(null)).map(({ job, subject, networkId }) => ({ job, subject, networkId }));

/** The poisoned station as the only trouble of a job. */
export const stationTrouble = ({ bad }: Places, job: string) => [
  { job, subject: `station ${bad.stationId}`, networkId: bad.networkId },
];

/** Four hours of minutes at both. */
export async function measuredAtBoth({ bad, sound }: Places): Promise<void> {
  for (const { stationId } of [bad, sound]) await storeMeasured(stationId, await invent(STRETCH, stationId));
}

/** An interval that says it has a set of bands that there is not. */
export async function poison({ bad }: Places): Promise<{ cure: () => Promise<unknown> }> {
  const where = { station_id: bad.stationId, starts_at: STRETCH.fromSec };
  const [first] = await db()('interval_levels')
    .where({ station_id: bad.stationId })
    .orderBy('starts_at')
    .limit(1);
  const key = { ...where, starts_at: first.starts_at };
  await db()('interval_levels').where(key).update({ band_set_id: NO_SUCH_BANDS });
  return { cure: () => db()('interval_levels').where(key).update({ band_set_id: first.band_set_id }) };
}

/** Rows of a station. */
export const countOf = async (table: string, stationId: number) =>
  Number((await db()(table).where({ station_id: stationId }).count({ count: '*' }).first())?.count);
