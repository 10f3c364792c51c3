import { bandSetOf } from '#db/queries/bandSets';
import { inTransaction } from '#db/queries/connection';
import { insertIntervals, type NewInterval } from '#db/queries/intervals';
import { insertNetwork, insertSettings } from '#db/queries/networks';
import { findStationById, insertStation, type StationRow } from '#db/queries/stations';
import { normalNoise, smoothNoise } from '#ingest/monitor/soundscape/noise';
import { bandRange } from '#lib/acoustics/bands';

/** The bands of every bench station: the 31 thirds 20 Hz–20 kHz. */
export const BANDS = bandRange(3, 20, 20_000);

/** Adds a network, by UTC unless another zone is named: every day has 24 hours. */
export function makeNetwork(slug = 'bench', timeZone = 'UTC'): Promise<number> {
  return inTransaction(async (transaction) => {
    const id = await insertNetwork({ slug, name: 'Bench' }, transaction);
    const settings = {
      effectiveFromSec: 0,
      timeZone,
      scheme: { dayStartMin: 7 * 60, eveningStartMin: 19 * 60, nightStartMin: 23 * 60 },
      minimumCoverage: 0.75,
      rules: { maximumWindSpeedMs: 5, excludeRain: false },
    };
    await insertSettings(id, settings, null, transaction);
    return id;
  });
}

/** Adds a station of thirds 20 Hz–20 kHz. */
export async function makeStation(networkId: number, code: string, intervalSec: number): Promise<StationRow> {
  const id = await inTransaction((transaction) =>
    insertStation(
      {
        networkId,
        code,
        name: `Bench ${code}`,
        latitude: 54.1,
        longitude: 1.6,
        bandFraction: 3,
        intervalSec,
        firstBandIndex: BANDS[0]?.index ?? NaN,
        lastBandIndex: BANDS.at(-1)?.index ?? NaN,
        placement: 'free-field',
        mastHeightM: 4,
        surroundings: '',
        acceptsFromSec: null,
      },
      transaction,
    ),
  );
  const station = await findStationById(id);
  if (!station) throw new Error('The station that was added is not there.');
  return station;
}

/** Invented intervals, the same at every run: levels that rise by day, bands about a slope, a flag now and then. */
export async function invent(startSec: number, count: number, intervalSec: number): Promise<NewInterval[]> {
  const { id: bandSetId } = await bandSetOf(
    3,
    BANDS.map(({ index }) => index),
  );
  return Array.from({ length: count }, (_, at) => {
    const second = startSec + at * intervalSec;
    const laeqCentiDb = Math.round(
      5200 - 700 * Math.cos((second / 86_400) * 2 * Math.PI) + 500 * smoothNoise(1, second, 300),
    );
    return {
      startSec: second,
      durationSec: intervalSec,
      laeqCentiDb,
      lafmaxCentiDb: laeqCentiDb + 900,
      lafminCentiDb: laeqCentiDb - 600,
      lceqCentiDb: laeqCentiDb + 800,
      lcpeakCentiDb: null,
      bandSetId,
      levelsCentiDb: Int16Array.from(BANDS, ({ index }, band) =>
        Math.round(laeqCentiDb - 900 - 30 * index + 250 * normalNoise(band, second)),
      ),
      flags: second % 97 === 0 ? 1 << 4 : 0,
      windSpeedMs: 2.5,
      windDirectionDeg: 240,
      temperatureC: 11.5,
      batteryV: 12.6,
      receivedAtSec: second + intervalSec + 20,
    };
  });
}

/** Adds invented intervals to the table alone, as fast as it takes them. */
export async function fill(
  stationId: number,
  startSec: number,
  count: number,
  intervalSec: number,
): Promise<void> {
  const part = 6000;
  for (let at = 0; at < count; at += part) {
    const size = Math.min(part, count - at);
    const intervals = await invent(startSec + at * intervalSec, size, intervalSec);
    await inTransaction((transaction) => insertIntervals(stationId, intervals, transaction));
  }
}
