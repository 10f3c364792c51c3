import { QUARTER_SEC } from '#lib/time/quarters';
import { localMinuteAt } from '#lib/time/zone';
import { overlapsAny, type Span } from '../levels/spans';

/** Quarter-hours after which a stretch is cut: a ship that stays for a week, or a week without one, is seven occasions. */
const LONGEST_STRETCH = 96;

/** A quarter-hour with the unbroken stretch (a day at most) that it belongs to. */
export interface Slot {
  startSec: number;
  block: number;
}

export interface SortedQuarters {
  /** Wholly within the activity. */
  on: Slot[];
  /** Without it, at hours of the day at which it also occurs. */
  off: Slot[];
  /** How many the activity covers in part: they count on neither side. */
  partly: number;
  /** How many are without it, at hours at which it never occurs. */
  otherHours: number;
}

type State = 'on' | 'off' | 'partly';

/** Sorts the quarter-hours of a period by an activity; `activity`: merged spans. */
export function sortQuarters(period: Span, activity: readonly Span[], zone: string): SortedQuarters {
  const states: { startSec: number; state: State; hour: number }[] = [];
  for (let startSec = period.fromSec; startSec < period.toSec; startSec += QUARTER_SEC) {
    const hour = Math.floor(localMinuteAt(startSec, zone) / 60);
    states.push({ startSec, state: stateOf(startSec, activity), hour });
  }
  const hours = new Set(states.filter(({ state }) => state === 'on').map(({ hour }) => hour));
  const sorted: SortedQuarters = { on: [], off: [], partly: 0, otherHours: 0 };
  let block = 0;
  let length = 0;
  let last: State | null = null;
  for (const { startSec, state, hour } of states) {
    const goesOn = state === last && length < LONGEST_STRETCH;
    if (!goesOn) block += 1;
    length = goesOn ? length + 1 : 1;
    last = state;
    if (state === 'partly') sorted.partly += 1;
    else if (state === 'on') sorted.on.push({ startSec, block });
    else if (hours.has(hour)) sorted.off.push({ startSec, block });
    else sorted.otherHours += 1;
  }
  return sorted;
}

function stateOf(startSec: number, activity: readonly Span[]): State {
  const endSec = startSec + QUARTER_SEC;
  if (!overlapsAny(activity, startSec, endSec)) return 'off';
  return activity.some(({ fromSec, toSec }) => fromSec <= startSec && endSec <= toSec) ? 'on' : 'partly';
}
