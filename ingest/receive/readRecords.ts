import { setImmediate as othersHadATurn } from 'node:timers/promises';
import { parseRecord, Refusal, type BandLayout, type ParsedInterval } from './parseRecord';

/** How far ahead of the server's clock an interval may end. */
export const MOST_AHEAD_SEC = 300;

/** A record that nothing speaks against by itself. */
export interface Candidate {
  /** Place in the post. */
  index: number;
  interval: ParsedInterval;
}

export interface Refused {
  index: number;
  refusal: Refusal;
}

/** What can be said of each record of a post by itself, before any is compared with what is stored. */
export function readRecords(
  intervals: readonly unknown[],
  bands: BandLayout | { problem: string },
  nowSec: number,
): { candidates: Candidate[]; refused: Refused[] } {
  const candidates: Candidate[] = [];
  const refused: Refused[] = [];
  intervals.forEach((record, index) => {
    try {
      if ('problem' in bands) throw new Refusal('unknown-band', bands.problem);
      const interval = parseRecord(record, bands);
      requirePast(interval, nowSec);
      candidates.push({ index, interval });
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      refused.push({ index, refusal: error });
    }
  });
  return { candidates, refused };
}

/** How many records are read before others of this process have a turn: about a millisecond's worth. */
const RECORDS_AT_A_TIME = 600;

/** As `readRecords`, letting others of this process have their turns between parts of a large post. */
export async function readRecordsInParts(
  intervals: readonly unknown[],
  bands: BandLayout | { problem: string },
  nowSec: number,
): Promise<{ candidates: Candidate[]; refused: Refused[] }> {
  const all = readRecords(intervals.slice(0, RECORDS_AT_A_TIME), bands, nowSec);
  for (let first = RECORDS_AT_A_TIME; first < intervals.length; first += RECORDS_AT_A_TIME) {
    await othersHadATurn();
    const part = readRecords(intervals.slice(first, first + RECORDS_AT_A_TIME), bands, nowSec);
    for (const one of part.candidates) all.candidates.push({ ...one, index: first + one.index });
    for (const one of part.refused) all.refused.push({ ...one, index: first + one.index });
  }
  return all;
}

function requirePast({ startSec, durationSec }: ParsedInterval, nowSec: number): void {
  const aheadSec = startSec + durationSec - nowSec;
  if (aheadSec > MOST_AHEAD_SEC) {
    throw new Refusal(
      'clock-ahead',
      `The interval ends ${Math.ceil(aheadSec)} s after the server's time; the monitor's clock is ahead.`,
    );
  }
}
