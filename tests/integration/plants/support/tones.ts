import { bandSetOf } from '#db/queries/bandSets';
import { type StoredInterval } from '#db/queries/intervals';
import { bandHolding, bandRange } from '#lib/acoustics/bands';
import { storeMeasured } from '../../levels/support/measured';

/** What a monitor heard: a broadband sound that falls gently with frequency, and perhaps a tone. */
export interface Heard {
  fromSec: number;
  toSec: number;
  /** Level of the 1 kHz third, dB. */
  levelDb: number;
  /** The tone is this far above its third, dB. */
  tone?: { hz: number; aboveDb: number };
}

/** Stores minutes of it for a station of thirds 25 Hz–8 kHz. LAeq is told as the level of the 1 kHz third plus 8 dB. */
export async function hear(stationId: number, { fromSec, toSec, levelDb, tone }: Heard): Promise<void> {
  const bands = bandRange(3, 25, 8000);
  const set = await bandSetOf(
    3,
    bands.map(({ index }) => index),
  );
  const toned = tone ? bandHolding(3, tone.hz)?.index : undefined;
  const levels = Int16Array.from(bands, ({ index }) =>
    Math.round(100 * (levelDb - index * 0.5 + (index === toned ? (tone?.aboveDb ?? 0) : 0))),
  );
  const intervals: StoredInterval[] = [];
  for (let startSec = fromSec; startSec < toSec; startSec += 60) {
    intervals.push({
      startSec,
      durationSec: 60,
      laeqCentiDb: Math.round(100 * (levelDb + 8)),
      lafmaxCentiDb: null,
      lafminCentiDb: null,
      lceqCentiDb: null,
      lcpeakCentiDb: null,
      bandSetId: set.id,
      bandFraction: set.fraction,
      bandIndices: set.indices,
      levelsCentiDb: levels,
      flags: 0,
      windSpeedMs: null,
      windDirectionDeg: null,
      temperatureC: null,
      batteryV: null,
      receivedAtSec: startSec + 80,
    });
  }
  await storeMeasured(stationId, intervals);
}
