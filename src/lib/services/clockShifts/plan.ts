import { selectStandingShifts, type ClockEpisode } from '#db/queries/clockShifts';
import { type Connection } from '#db/queries/connection';
import { LONGEST_INTERVAL_SEC } from '#db/queries/intervals';
import { countStarts, selectStretches, type StoredStretch } from '#db/queries/shiftedStarts';
import { MOST_SHIFTED_INTERVALS } from '#lib/contracts/clockShifts';
import { quartersTouching } from '#lib/time/quarters';
import { done, invalid, type Outcome } from '../outcome';
import { collisionsOf, isOfEpisode } from './episode';

/** How far a monitor's clock may be ahead of ours: as far as receiving lets it. */
const MOST_AHEAD_SEC = 300;

/** What carrying out a shift would do. */
export interface ShiftPlan {
  moving: StoredStretch[];
  /** Of those that move: which would meet one that stays. While there are any, nothing can be moved. */
  colliding: StoredStretch[];
  /** Quarter-hours that lose or gain something. */
  quarterCount: number;
}

/** Looks at what an episode is made of and whether it can move as a whole. */
export async function planShift(
  stationId: number,
  episode: ClockEpisode,
  nowSec: number,
  conn: Connection,
): Promise<Outcome<ShiftPlan>> {
  const { fromSec, toSec, shiftSec } = episode;
  if (toSec > nowSec + MOST_AHEAD_SEC) return invalid('to', 'must not lie in the future');
  if (fromSec + shiftSec < 0) return invalid('shiftSeconds', 'would move intervals before 1970');
  const standing = await selectStandingShifts(stationId, conn);
  if (standing.some((one) => one.state !== 'moved')) {
    return invalid('from', 'must wait until the shift that is under way is done');
  }
  if (standing.some((one) => one.fromSec < toSec && one.toSec > fromSec)) {
    return invalid('from', 'overlaps an episode that is shifted already: reverse that first');
  }
  const count = await countStarts(stationId, fromSec, toSec, conn);
  if (count > MOST_SHIFTED_INTERVALS) {
    return invalid('to', `must be earlier: at most ${MOST_SHIFTED_INTERVALS} intervals move at once`);
  }
  const moving = (await selectStretches(stationId, fromSec, toSec, conn)).filter((one) =>
    isOfEpisode(one, episode),
  );
  const last = moving.at(-1);
  if (!last) return invalid('from', 'is before no interval of this episode: nothing would move');
  if (last.startSec + last.durationSec + shiftSec > nowSec + MOST_AHEAD_SEC) {
    return invalid('shiftSeconds', 'would move intervals into the future');
  }
  const target = {
    fromSec: fromSec + shiftSec - LONGEST_INTERVAL_SEC,
    toSec: toSec + shiftSec + LONGEST_INTERVAL_SEC,
  };
  const around = await selectStretches(stationId, target.fromSec, target.toSec, conn);
  return done({
    moving,
    colliding: collisionsOf(moving, around, episode),
    quarterCount: quartersOf(moving, shiftSec),
  });
}

function quartersOf(moving: readonly StoredStretch[], shiftSec: number): number {
  const quarters = new Set<number>();
  for (const { startSec, durationSec } of moving) {
    for (const fromSec of [startSec, startSec + shiftSec]) {
      for (const quarter of quartersTouching(fromSec, fromSec + durationSec)) quarters.add(quarter);
    }
  }
  return quarters.size;
}
