import type { AlertPreferences } from '#db/queries/alertPreferences';
import { addDays, instantAtSec, localDateAt, localMinuteAt } from '#lib/time/zone';

export interface AlertMoment {
  nowSec: number;
  /** When the person was last sent a message of this network's exceedances; null: never. */
  lastToldSec: number | null;
  /** How far above the limit, tenths of a dB; null for what is no longer above. */
  excessTenths: number | null;
}

type Times = Pick<
  AlertPreferences,
  'delivery' | 'dailyAtMin' | 'groupMin' | 'quietFromMin' | 'quietToMin' | 'overrideTenths'
>;

const DAY_MIN = 1440;
/** Every zone changes its clock at a whole quarter-hour. */
const QUARTER_SEC = 900;

/**
 * When a person is to be told (epoch seconds, not before now), by the clock on the network's wall. What exceeds the limit by the
 * override waits neither for a digest nor for the end of quiet hours; messages keep their least distance all the same.
 */
export function alertDueSec(preferences: Times, moment: AlertMoment, zone: string): number {
  const { nowSec, lastToldSec, excessTenths } = moment;
  const { groupMin, overrideTenths } = preferences;
  const spacedSec = lastToldSec === null ? nowSec : Math.max(nowSec, lastToldSec + groupMin * 60);
  if (overrideTenths !== null && excessTenths !== null && excessTenths >= overrideTenths) return spacedSec;
  return endOfQuietSec(deliverySec(preferences, nowSec, spacedSec, zone), preferences, zone);
}

function deliverySec(
  { delivery, dailyAtMin }: Times,
  nowSec: number,
  spacedSec: number,
  zone: string,
): number {
  switch (delivery) {
    case 'at-once':
      return spacedSec;
    case 'hourly':
      return Math.floor(nowSec / 60) * 60 + (60 - (localMinuteAt(nowSec, zone) % 60)) * 60;
    case 'daily': {
      const today = localDateAt(nowSec, zone);
      const todaySec = instantAtSec(today, dailyAtMin, zone);
      return todaySec > nowSec ? todaySec : instantAtSec(addDays(today, 1), dailyAtMin, zone);
    }
  }
}

/**
 * The first instant from `sec` on at which the clock shows no quiet hour. Goes by quarter-hours, so that a clock put forward over
 * the end, or back to before it, is met as it happens.
 */
function endOfQuietSec(sec: number, { quietFromMin, quietToMin }: Times, zone: string): number {
  if (quietFromMin === null || quietToMin === null) return sec;
  let atSec = sec;
  for (let minute = localMinuteAt(atSec, zone); isWithin(minute, quietFromMin, quietToMin);) {
    const endSec = Math.floor(atSec / 60) * 60 + minutesUntil(minute, quietToMin) * 60;
    atSec = Math.min(endSec, (Math.floor(atSec / QUARTER_SEC) + 1) * QUARTER_SEC);
    minute = localMinuteAt(atSec, zone);
  }
  return atSec;
}

/** Whether the clock shows one of a person's quiet hours. */
export function isQuiet(
  { quietFromMin, quietToMin }: Pick<Times, 'quietFromMin' | 'quietToMin'>,
  nowSec: number,
  zone: string,
): boolean {
  if (quietFromMin === null || quietToMin === null) return false;
  return isWithin(localMinuteAt(nowSec, zone), quietFromMin, quietToMin);
}

/** Whether a minute of the day lies in `from <= m < to`, which may go over midnight. */
function isWithin(minute: number, from: number, to: number): boolean {
  return from < to ? from <= minute && minute < to : minute >= from || minute < to;
}

function minutesUntil(minute: number, to: number): number {
  return (to - minute + DAY_MIN) % DAY_MIN || DAY_MIN;
}
