import { bandLabel, type Band, type BandFraction } from '#lib/acoustics/bands';
import { LIMIT_METRICS, needsNoCoverage } from '#lib/acoustics/limitQuantities';
import { formatInstantUtc, parseInstant } from '#lib/contracts/common';
import { WEEKDAYS, type Limit } from '#lib/contracts/limits';
import { typedNumber, type FormValues } from '#lib/http/forms';
import { parseUrlInstant, urlInstant } from '#lib/time/urlPeriod';

/** What stands in the fields of the form. */
export type LimitValues = Pick<FormValues, 'text' | 'all'>;

/**
 * What was typed into the form of a limit, as the interface's JSON has it; its schema judges the values. A band, stations and a
 * minimum coverage count only where they go with the other choices: without scripts their fields are always there.
 */
export function limitOfForm({ text, all }: LimitValues, zone: string) {
  return {
    name: text['name'] ?? '',
    metric: text['metric'],
    window: text['window'],
    windowMinutes: text['window'] === 'length' ? (typedNumber(text['windowMinutes']) ?? null) : null,
    stepMinutes: hasSteps(text['window']) ? stepOf(text['stepMinutes']) : null,
    ...parametersOf(text),
    threshold: typedNumber(text['threshold']),
    weekdays: all('weekdays'),
    holidays: text['holidays'] || 'as-weekday',
    from: text['from'] || null,
    to: text['to'] || null,
    minimumCoverage: hasCoverage(text['metric']) ? fractionOf(text['minimumCoverage']) : null,
    ...windOf(text),
    stations: text['scope'] === 'chosen' ? all('stations') : null,
    group: text['scope'] === 'group' ? Number(text['group']) : null,
    recipients: (text['recipients'] ?? '').split(/[\s,;]+/).filter((address) => address !== ''),
    effectiveFrom: instantOf(text['effectiveFrom'] ?? '', zone),
    reason: text['reason'] ?? '',
  };
}

/** What the form of a new limit shows at first. */
export const NEW_LIMIT_VALUES: LimitValues = valuesOf(
  { metric: 'LAeq', window: '15min', scope: 'all' },
  { weekdays: WEEKDAYS },
);

/**
 * What the form shows of a limit that is to be changed: all but the reason. A change holds from now on unless told otherwise; one
 * of a limit that is to come, from when that would.
 */
export function limitValues(limit: Limit, zone: string): LimitValues {
  const { bandFraction, bandHz, minimumCoverage, stations, group, recipients = [] } = limit;
  const upcomingSec = limit.state === 'upcoming' ? parseInstant(limit.effectiveFrom) : null;
  const isAllDay = limit.from === '00:00' && limit.to === '24:00';
  return valuesOf(
    {
      name: limit.name,
      metric: limit.metric,
      window: limit.window,
      windowMinutes: numberText(limit.windowMinutes),
      stepMinutes: numberText(limit.stepMinutes),
      holidays: limit.holidays,
      band: bandFraction === null || bandHz === null ? '' : bandValue(bandFraction, bandHz),
      bandTo: bandFraction === null || limit.bandToHz === null ? '' : bandValue(bandFraction, limit.bandToHz),
      percent: limit.metric === 'LAN' ? numberText(limit.percent) : '10',
      eventThreshold: numberText(limit.eventThreshold),
      eventSeconds: numberText(limit.eventSeconds),
      eventGap: numberText(limit.eventGap),
      backgroundPercent: limit.metric === 'LAeqLessLA90' ? String(limit.percent ?? 90) : '90',
      backgroundFrom: limit.backgroundFrom ?? '',
      // A time control has no 24:00.
      backgroundTo: limit.backgroundTo?.replace('24:00', '00:00') ?? '',
      ...Object.fromEntries(WIND_NUMBERS.map((name) => [name, numberText(limit[name])])),
      windUnknown: limit.windUnknown,
      threshold: String(limit.threshold),
      from: isAllDay ? '' : (limit.from ?? ''),
      // A time control has no 24:00; for windows that begin before it, 00:00 is the same.
      to: isAllDay ? '' : (limit.to?.replace('24:00', '00:00') ?? ''),
      minimumCoverage: minimumCoverage === null ? '' : String(Math.round(minimumCoverage * 10_000) / 100),
      scope: group !== null ? 'group' : stations === null ? 'all' : 'chosen',
      group: group === null ? '' : String(group),
      recipients: recipients.join('\n'),
      effectiveFrom: upcomingSec === null ? '' : urlInstant(upcomingSec, zone),
    },
    { weekdays: limit.weekdays, stations: group === null ? (stations ?? []) : [] },
  );
}

/** Bands as choices of the form, by their nominal labels. */
export function bandChoices(bands: readonly Band[]): { value: string; label: string }[] {
  return bands.map((band) => ({
    value: bandValue(band.fraction, band.nominalHz),
    label: `${bandLabel(band)} ${band.fraction === 3 ? 'third' : 'octave'}`,
  }));
}

function bandValue(fraction: BandFraction, nominalHz: number): string {
  return `${fraction}:${nominalHz}`;
}

/** What the quantity takes besides: bands, N, or what makes an event. */
function parametersOf(text: LimitValues['text']) {
  switch (text['metric']) {
    case 'bandLeq':
      return bandOf(text['band'] ?? '');
    case 'bandGroupLeq':
      return { ...bandOf(text['band'] ?? ''), bandToHz: bandOf(text['bandTo'] ?? '').bandHz };
    case 'LAN':
      return { percent: typedNumber(text['percent']) ?? null };
    case 'LAeqLessLA90':
      return {
        percent: typedNumber(text['backgroundPercent']) ?? null,
        backgroundFrom: text['backgroundFrom'] || null,
        backgroundTo: text['backgroundTo'] || null,
      };
    case 'eventCount':
    case 'eventLAE':
      return {
        eventThreshold: typedNumber(text['eventThreshold']) ?? null,
        eventSeconds: typedNumber(text['eventSeconds']) ?? null,
        eventGap: typedNumber(text['eventGap']) ?? null,
      };
    default:
      return {};
  }
}

function hasCoverage(metric: string | undefined): boolean {
  return !LIMIT_METRICS.some((one) => one === metric && needsNoCoverage(one));
}

/** Fields of the wind that are numbers, named alike in the form and in the interface. */
const WIND_NUMBERS = ['windMinimum', 'windMaximum', 'windFrom', 'windTo', 'windDismissAbove'] as const;

function windOf(text: LimitValues['text']) {
  const numbers = WIND_NUMBERS.map((name) => [name, typedNumber(text[name]) ?? null] as const);
  return { ...Object.fromEntries(numbers), windUnknown: text['windUnknown'] || 'left-out' };
}

function numberText(value: number | null): string {
  return value === null ? '' : String(value);
}

function hasSteps(window: string | undefined): boolean {
  return window === '15min' || window === '1h' || window === 'length';
}

function stepOf(text: string | undefined): number | null {
  return text ? Number(text) : null;
}

/** Where none is chosen the width does not matter: what is missing is the band. */
function bandOf(value: string) {
  if (value === '') return { bandFraction: 3, bandHz: null };
  const [fraction, hz] = value.split(':').map(Number);
  return { bandFraction: fraction, bandHz: hz };
}

function fractionOf(percent: string | undefined): number | null {
  const typed = typedNumber(percent?.replace('%', '').trim());
  return typed === undefined ? null : typed / 100;
}

/** What cannot be read is left for the schema to refuse. */
function instantOf(text: string, zone: string): string | undefined {
  if (text === '') return undefined;
  const sec = parseUrlInstant(text, zone);
  return sec === null ? text : formatInstantUtc(sec);
}

function valuesOf(
  text: Record<string, string>,
  lists: Readonly<Record<string, readonly string[]>>,
): LimitValues {
  return { text, all: (name) => [...(lists[name] ?? [])] };
}
