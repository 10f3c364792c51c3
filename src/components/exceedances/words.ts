import { parseInstant } from '#lib/contracts/common';
import type { Conditions, LimitWind } from '#lib/contracts/exceedanceDetail';
import type { Acknowledgement, Cause, Exceedance, ExceedanceDetail } from '#lib/contracts/exceedances';
import type { LimitVersionView } from '#lib/contracts/limits';
import { formatDuration } from '#lib/format/durations';
import { formatCoverage } from '#lib/format/levels';
import { limitValueText } from '#lib/format/limitMetric';
import { formatInstantShort, formatPeriod } from '#lib/format/times';
import { formatSpeed } from '#lib/format/wind';
import { datesWords } from '../limits/words';

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

/** What was found, in sentences that hold descriptors to be typeset; of a lifted one, what it was and what is left. */
export function findingWords(exceedance: ExceedanceDetail): string {
  if (exceedance.state === 'standing') return `${aboveWords(exceedance, exceedance)}.`;
  const stood = exceedance.revisions.findLast(({ state }) => state === 'standing');
  const before = stood ? ` Before that, ${aboveWords(exceedance, stood)}.` : '';
  return `This exceedance no longer stands: later data, an exclusion or a change of the limit took it away.${before}${leftWords(exceedance)}`;
}

interface Compared {
  level: number;
  threshold: number;
  coverage: number;
}

function aboveWords(
  { descriptor, loudest, unit }: Exceedance,
  { level, threshold, coverage }: Compared,
): string {
  const of = loudest ? 'the loudest window' : 'the window';
  const measured = `${descriptor} was ${limitValueText(level, unit)} with ${formatCoverage(coverage)} of ${of} covered`;
  return `${measured}: ${limitValueText(level - threshold, unit)} above the limit of ${limitValueText(threshold, unit)}`;
}

function leftWords({ level, threshold, coverage, unit }: Exceedance): string {
  if (coverage === 0) return ' When it was lifted, no valid data were left of the window.';
  return ` When it was lifted, the level was ${limitValueText(level, unit)} against a limit of ${limitValueText(threshold, unit)}, with ${formatCoverage(coverage)} covered.`;
}

/** "Tue 17 March 2026, 22:05 to 23:05" of the loudest rolling window. */
export function loudestWords({ from, to }: NonNullable<Exceedance['loudest']>, zone: string): string {
  return formatPeriod({ fromSec: parseInstant(from) ?? 0, toSec: parseInstant(to) ?? 0 }, zone);
}

/** Whether an exceedance was lifted because its data are gone: its level is the one that it was found with. */
export function isWithoutData({ state, coverage }: Exceedance): boolean {
  return state === 'lifted' && coverage === 0;
}

/** When a limit applies: "every day", "Mon–Fri, not on holidays, windows that begin 23:00–07:00". */
export function whenWords({ weekdays, holidays, window, from, to }: LimitVersionView): string {
  const days = datesWords(weekdays, holidays);
  if (!from || !to) return days;
  return window === 'hours' ? `${days}, ${from}–${to}` : `${days}, windows that begin ${from}–${to}`;
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

/** "mean 4.3 m/s; 30 min within, 15 min outside, 15 min unknown" of what was measured. */
export function limitWindWords(wind: LimitWind): string {
  const { meanSpeed, secondsWithin, secondsOutside, secondsUnknown } = wind;
  const parts = [
    [secondsWithin, 'within'],
    [secondsOutside, 'outside'],
    [secondsUnknown, 'unknown'],
  ] as const;
  const told = parts.filter(([seconds]) => seconds > 0);
  const mean = meanSpeed === null ? 'no speed known' : `mean ${formatSpeed(meanSpeed)}`;
  return `${mean}; ${told.map(([seconds, place]) => `${formatDuration(seconds)} ${place}`).join(', ') || 'nothing measured'}`;
}

/** A distance between stations: "350 m", "1.2 km". */
export function distanceWords(metres: number): string {
  return metres < 1000 ? `${Math.round(metres / 10) * 10} m` : `${(metres / 1000).toFixed(1)} km`;
}

/** "17 Mar 12:00": an instant to the minute. */
export function minuteWords(sec: number, zone: string): string {
  return formatInstantShort(Math.floor(sec / 60) * 60, zone);
}
