import type { Conditions } from '#lib/contracts/exceedanceDetail';
import type { Acknowledgement, Cause, Exceedance } from '#lib/contracts/exceedances';
import { WEEKDAYS, type LimitVersionView } from '#lib/contracts/limits';
import { formatDuration } from '#lib/format/durations';
import { formatCoverage, formatLevelDb } from '#lib/format/levels';

export const CAUSE_WORDS: Readonly<Record<Cause, string>> = {
  plant: 'Fixed plant: fans, pumps, engines',
  loading: 'Loading, unloading, handling',
  'building-works': 'Building works',
  vehicles: 'Road vehicles',
  rail: 'Rail',
  vessels: 'Vessels',
  aircraft: 'Aircraft',
  people: 'People, music, an event',
  weather: 'Weather: wind, rain, thunder, surf',
  animals: 'Animals',
  instrument: 'The instrument, or somebody beside it',
  'not-found': 'Looked for, not found',
  other: 'Something else',
};

export const STATE_WORDS: Readonly<Record<Exceedance['state'], string>> = {
  standing: 'stands',
  lifted: 'no longer stands',
};

/** The cause as told: "Building works: pile driving at berth 3"; null where none is. */
export function causeWords({
  cause,
  causeDetail,
}: Pick<Acknowledgement, 'cause' | 'causeDetail'>): string | null {
  const words = cause && CAUSE_WORDS[cause];
  return [words, causeDetail].filter(Boolean).join(': ') || null;
}

/** What was found, in a sentence that holds a descriptor to be typeset. */
export function findingWords(exceedance: Exceedance): string {
  const { descriptor, level, threshold, excess, coverage, state } = exceedance;
  const measured = `${descriptor} was ${formatLevelDb(level)} dB with ${formatCoverage(coverage)} of the window covered`;
  const limit = `the limit of ${formatLevelDb(threshold)} dB`;
  if (state === 'standing') return `${measured}: ${formatLevelDb(excess)} dB above ${limit}.`;
  const against = excess > 0 ? `${formatLevelDb(excess)} dB above ${limit}` : `not above ${limit}`;
  return `This exceedance no longer stands. When it was lifted, ${measured}, ${against}; later data, an exclusion or a change of the limit took it away.`;
}

/** When a limit applies: "every day", "Mon, Tue, 23:00–07:00". */
export function whenWords({ weekdays, from, to }: LimitVersionView): string {
  const days =
    weekdays.length === WEEKDAYS.length
      ? 'every day'
      : weekdays.map((day) => day.charAt(0).toUpperCase() + day.slice(1)).join(', ');
  return from && to ? `${days}, windows that begin ${from}–${to}` : days;
}

const FLAG_WORDS: Readonly<Record<string, string>> = {
  overload: 'overload',
  underrange: 'below the instrument’s range',
  calibration: 'calibration',
  selfcheck: 'self-check',
  rain: 'rain',
  wind: 'wind',
  tamper: 'tampering',
  powerloss: 'loss of power',
  clockset: 'clock set',
};

/** Flags with how long they hold: "rain for 15 min, wind for 2 min"; null without any. */
export function flagsWords({ flags }: Conditions): string | null {
  const words = flags.map(
    ({ flag, seconds }) => `${FLAG_WORDS[flag] ?? flag} for ${formatDuration(seconds)}`,
  );
  return words.length === 0 ? null : words.join(', ');
}

/** A distance between stations: "350 m", "1.2 km". */
export function distanceWords(metres: number): string {
  return metres < 1000 ? `${Math.round(metres / 10) * 10} m` : `${(metres / 1000).toFixed(1)} km`;
}
