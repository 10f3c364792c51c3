import { type ClockEpisode } from '#db/queries/clockShifts';
import { type StoredStretch } from '#db/queries/shiftedStarts';

interface Stretch {
  startSec: number;
  durationSec: number;
}

/** Whether a stored interval is of an episode: begins in it, came late enough, and no shift has moved it. */
export function isOfEpisode(
  { startSec, receivedAtSec, shiftId }: StoredStretch,
  { fromSec, toSec, receivedFromSec }: ClockEpisode,
): boolean {
  return startSec >= fromSec && startSec < toSec && receivedAtSec >= receivedFromSec && shiftId === null;
}

/** Whether two stretches have a second in common. */
export function overlap(a: Stretch, b: Stretch): boolean {
  return a.startSec < b.startSec + b.durationSec && b.startSec < a.startSec + a.durationSec;
}

/**
 * Intervals of an episode that would meet a stored one that does not move with them. Both lists ascend and overlap nowhere within
 * themselves.
 */
export function collisionsOf<T extends Stretch>(
  moving: readonly T[],
  stored: readonly StoredStretch[],
  episode: ClockEpisode,
): T[] {
  const staying = stored.filter((one) => !isOfEpisode(one, episode));
  let at = 0;
  return moving.filter(({ startSec, durationSec }) => {
    const target = { startSec: startSec + episode.shiftSec, durationSec };
    const ends = ({ startSec: start, durationSec: duration }: Stretch) => start + duration;
    while (at < staying.length && ends(staying[at] ?? target) <= target.startSec) at += 1;
    const next = staying[at];
    return next !== undefined && overlap(next, target);
  });
}
