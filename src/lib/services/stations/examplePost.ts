import type { z } from 'zod';
import { type StationRow } from '#db/queries/stations';
import { bandAt, bandRange } from '#lib/acoustics/bands';
import { roundHalfUp } from '#lib/acoustics/rounding';
import { levelFromBandsDb } from '#lib/acoustics/weighting';
import { formatInstantUtc } from '#lib/contracts/common';
import { type postedIntervalSchema } from '#lib/contracts/intervals';

type SendingStation = Pick<StationRow, 'bandFraction' | 'firstBandIndex' | 'lastBandIndex' | 'intervalSec'>;

const EXAMPLE_BAND_DB = 40;

/**
 * One interval as the station's monitor would post it: its own bands, the last whole interval before `nowSec`, invented
 * levels. It is flagged as a self-check, so that no figure counts it.
 */
export function examplePost(
  station: SendingStation,
  nowSec: number,
): { bands: number[]; intervals: z.input<typeof postedIntervalSchema>[] } {
  const { bandFraction, intervalSec } = station;
  const hzOf = (index: number) => bandAt(bandFraction, index).nominalHz;
  const bands = bandRange(bandFraction, hzOf(station.firstBandIndex), hzOf(station.lastBandIndex));
  const levels = bands.map(() => EXAMPLE_BAND_DB);
  const startSec = (Math.floor(nowSec / intervalSec) - 1) * intervalSec;
  return {
    bands: bands.map(({ nominalHz }) => nominalHz),
    intervals: [
      {
        start: formatInstantUtc(startSec),
        seconds: intervalSec,
        LAeq: roundHalfUp(levelFromBandsDb(levels, bands, 'A') ?? EXAMPLE_BAND_DB, 1),
        levels,
        flags: ['selfcheck'],
      },
    ],
  };
}
