import { inTransaction } from '#db/queries/connection';
import { bandSetOf } from '#db/queries/bandSets';
import { insertDirtyMarks } from '#db/queries/dirtyMarks';
import { insertIntervals, type NewInterval } from '#db/queries/intervals';
import { quartersTouching } from '#lib/time/quarters';

/** Bands of the stations that `makeStation` makes: thirds 25 Hz–8 kHz. */
const BAND_INDICES = Array.from({ length: 26 }, (_, at) => at - 16);

export interface Minute {
  laeqCentiDb: number;
  /** Level of a band index; 40 dB in every band when left out. */
  bandCentiDb?: (bandIndex: number) => number;
  flags?: number;
}

/** Stores a station's minutes of `fromSec <= t < toSec` as if received, marked to be recomputed. */
export async function storeMinutes(
  stationId: number,
  fromSec: number,
  toSec: number,
  minuteAt: (startSec: number) => Minute | null,
): Promise<void> {
  const bandSet = await bandSetOf(3, BAND_INDICES);
  const intervals: NewInterval[] = [];
  for (let startSec = fromSec; startSec < toSec; startSec += 60) {
    const minute = minuteAt(startSec);
    if (!minute) continue;
    const { laeqCentiDb, bandCentiDb = () => 4000, flags = 0 } = minute;
    intervals.push({
      startSec,
      durationSec: 60,
      laeqCentiDb,
      lafmaxCentiDb: laeqCentiDb + 900,
      lafminCentiDb: laeqCentiDb - 500,
      lceqCentiDb: null,
      lcpeakCentiDb: null,
      bandSetId: bandSet.id,
      levelsCentiDb: Int16Array.from(BAND_INDICES, bandCentiDb),
      flags,
      windSpeedMs: null,
      windDirectionDeg: null,
      temperatureC: null,
      batteryV: null,
      receivedAtSec: startSec + 60,
    });
  }
  await inTransaction(async (transaction) => {
    await insertIntervals(stationId, intervals, transaction);
    await insertDirtyMarks(stationId, quartersTouching(fromSec, toSec), transaction);
  });
}

/** Epoch seconds of an instant. */
export const at = (instant: string) => Date.parse(instant) / 1000;
