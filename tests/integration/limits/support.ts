import { aggregateAll } from '#ingest/aggregate/aggregate';
import { pendWindowsFor } from '#ingest/detect/pendWindows';
import { judgeDueWindows, type TellChanges, type TellingChange } from '#ingest/detect/judge';
import { receiveBatch } from '#ingest/receive/receive';

/** An interval but for when it is; its levels of 100 Hz or of `BANDS_SENT`. */
export interface Sent {
  LAeq: number;
  LAFmax?: number;
  LCeq?: number;
  windSpeed?: number;
  windDirection?: number;
  levels: readonly number[];
}

/** Thirds of an interval that has as many levels, the last one 200 Hz; of one level alone 100 Hz. */
function bandsOf(count: number) {
  const [hz, indices] =
    count === 1
      ? [[100], [-10]]
      : [
          [80, 100, 125, 160, 200],
          [-11, -10, -9, -8, -7],
        ];
  return { bands: hz.slice(0, count), bandIndices: { indices: indices.slice(0, count) } };
}

/** Sends intervals of a station (thirds), one after the other from an instant on. They are not computed yet. */
export async function send(
  stationId: number,
  fromSec: number,
  sent: readonly Sent[],
  intervalSec = 60,
): Promise<void> {
  const intervals = sent.map((one, at) => ({
    ...one,
    levels: [...one.levels],
    start: new Date((fromSec + at * intervalSec) * 1000).toISOString(),
    seconds: intervalSec,
  }));
  const envelope = { ...bandsOf(sent[0]?.levels.length ?? 0), intervals };
  await receiveBatch({ id: stationId, bandFraction: 3, acceptsFromSec: null }, envelope, new Date());
}

/** As many minutes at one level. */
export function minutesAt(LAeq: number, minutes: number): Sent[] {
  return Array.from({ length: minutes }, () => ({ LAeq, levels: [LAeq] }));
}

/** Computes what was sent and judges what is due; answers what there is to tell, after telling it. */
export async function judged(tell?: TellChanges, now = new Date()): Promise<TellingChange[]> {
  await aggregateAll(pendWindowsFor);
  const changes: TellingChange[] = [];
  const note: TellChanges = async (some, ...rest) => {
    changes.push(...some);
    await tell?.(some, ...rest);
  };
  while ((await judgeDueWindows(now, note)) > 0);
  return changes;
}
