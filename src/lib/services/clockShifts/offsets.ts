import { selectOffsets, type ClockOffset } from '#db/queries/clockOffsets';
import { type ClockOffsets } from '#lib/contracts/clockShifts';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Span } from '../levels/spans';

/** Offsets of a station's clock in a period of ours. */
export async function clockOffsets(stationId: number, { fromSec, toSec }: Span): Promise<ClockOffsets> {
  const offsets = await selectOffsets(stationId, fromSec, toSec);
  return {
    items: offsets.map(({ quarterStartSec, aheadSec }) => ({
      at: formatInstantUtc(quarterStartSec),
      aheadSeconds: aheadSec,
    })),
  };
}

/**
 * Shift in whole seconds that puts an episode of the monitor's clock right: the median of the offsets measured while its clock
 * showed that time, the other way round; null where none was.
 */
export function suggestedShiftSec(offsets: readonly ClockOffset[], { fromSec, toSec }: Span): number | null {
  const ahead = offsets
    .filter(({ quarterStartSec, aheadSec }) => {
      const shownSec = quarterStartSec + aheadSec;
      return shownSec >= fromSec && shownSec < toSec;
    })
    .map(({ aheadSec }) => aheadSec)
    .sort((a, b) => a - b);
  const middle = ahead[Math.floor(ahead.length / 2)];
  return middle === undefined ? null : -Math.round(middle) + 0;
}

/** A stretch of quarter-hours whose clock was further off than a bound, in the monitor's time. */
export interface SuggestedEpisode extends Span {
  shiftSec: number;
  /** What came before had the right time. */
  receivedFromSec: number;
}

const QUARTER_SEC = 900;
/** Silence for longer than this ends an episode. */
const BRIDGED_SEC = 6 * 3600;

/** Episodes that the offsets tell of, ascending; one's offsets differ by less than the bound. */
export function suggestedEpisodes(offsets: readonly ClockOffset[], boundSec: number): SuggestedEpisode[] {
  const episodes: { first: ClockOffset; last: ClockOffset; aheadSec: number[] }[] = [];
  for (const offset of offsets.filter(({ aheadSec }) => Math.abs(aheadSec) > boundSec)) {
    const now = episodes.at(-1);
    const follows =
      now &&
      offset.quarterStartSec - now.last.quarterStartSec <= BRIDGED_SEC &&
      Math.abs(offset.aheadSec - now.first.aheadSec) < boundSec;
    if (follows) {
      now.last = offset;
      now.aheadSec.push(offset.aheadSec);
    } else episodes.push({ first: offset, last: offset, aheadSec: [offset.aheadSec] });
  }
  return episodes.map(({ first, last, aheadSec }) => {
    const middle = [...aheadSec].sort((a, b) => a - b)[Math.floor(aheadSec.length / 2)] ?? 0;
    return {
      fromSec: wholeMinute(first.quarterStartSec + first.aheadSec),
      toSec: wholeMinute(last.quarterStartSec + QUARTER_SEC + last.aheadSec),
      shiftSec: -Math.round(middle),
      receivedFromSec: first.quarterStartSec,
    };
  });
}

/** Forms ask for minutes. */
const wholeMinute = (sec: number) => Math.round(sec / 60) * 60;
