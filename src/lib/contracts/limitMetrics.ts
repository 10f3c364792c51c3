import { z } from 'zod';
import { bandByNominalHz } from '#lib/acoustics/bands';
import {
  EVENT_METRICS,
  LIMIT_METRICS,
  type LimitMetricName,
  type LimitWindowName,
} from '#lib/acoustics/limitQuantities';
import { clockTime } from './common';
import { GRAIN_MIN } from './limitWindows';

export const LIMIT_UNITS = ['dB', '%', 'events'] as const;

/** N of the L_N that a limit may be about. */
export const LIMIT_PERCENTS = [1, 5, 10, 50, 90, 95, 99] as const;

/** Quantities that are not told by the sums of the window alone: they have no rolling windows. */
const FIXED_ONLY: readonly LimitMetricName[] = ['Lden', 'LAeqLessUsual', 'tonalShare', ...EVENT_METRICS];

/** N of the L_N that may be the background. */
export const BACKGROUND_PERCENTS = [90, 95] as const;
/** Gaps that end no event, where a limit tells no other, s. */
export const EVENT_GAP_SEC = 10;

export const limitMetric = z
  .enum(LIMIT_METRICS, 'must be one of the list')
  .describe(
    'bandLeq, bandGroupLeq: the unweighted level of one band, or of several together. LCeqLessLAeq, LAeqLessLA90: differences within ' +
      'the window. LAeqLessUsual: above the median of the same weekday and clock window of the eight weeks before. tonalShare: per cent ' +
      'of the time with a tone by the survey method. eventCount: how many events. eventLAE: the greatest LAE of a single event',
  );
export const limitBandFraction = z.union([z.literal(1), z.literal(3)], 'must be 1 (octaves) or 3 (thirds)');

const hz = z.number('must be a nominal frequency in Hz').nullable().default(null);

/** Fields of what a limit is about. */
export const metricFields = {
  metric: limitMetric,
  bandHz: hz,
  bandFraction: limitBandFraction.nullable().default(null),
  bandToHz: hz.describe('Of bandGroupLeq the last band; the first is bandHz'),
  percent: z
    .number('must be one of the list')
    .refine((percent) => LIMIT_PERCENTS.some((one) => one === percent), 'must be one of the list')
    .nullable()
    .default(null)
    .describe(
      `Of LAN: ${LIMIT_PERCENTS.join(', ')}; of the background of LAeqLessLA90: ${BACKGROUND_PERCENTS.join(' or ')}, null: 90`,
    ),
  backgroundFrom: clockTime
    .nullable()
    .default(null)
    .describe(
      'Of LAeqLessLA90: local time at which the hours of the background begin; the last such hours that ended by the beginning of the ' +
        'window count, and need its coverage. Null: the window itself is its own background',
    ),
  backgroundTo: clockTime.nullable().default(null).describe('Before backgroundFrom: across midnight'),
  eventThreshold: z
    .number('must be a level in dB')
    .min(-20, 'must be −20 to 200 dB')
    .max(200, 'must be −20 to 200 dB')
    .nullable()
    .default(null)
    .describe(
      'Of eventCount and eventLAE: an event is a run of intervals whose LAeq, to tenths, is greater; dB',
    ),
  eventSeconds: z
    .number('must be a number of seconds')
    .int('must be whole seconds')
    .min(1, 'must be 1 to 3600 s')
    .max(3600, 'must be 1 to 3600 s')
    .nullable()
    .default(null)
    .describe('Of eventCount and eventLAE: how long an event is at least'),
  eventGap: z
    .number('must be a number of seconds')
    .int('must be whole seconds')
    .min(0, 'must be 0 to 600 s')
    .max(600, 'must be 0 to 600 s')
    .nullable()
    .default(null)
    .describe(
      `Of eventCount and eventLAE: gaps up to this long, quieter or without data, do not end an event; null: ${EVENT_GAP_SEC} s`,
    ),
  threshold: z
    .number('must be a number')
    .min(-20, 'must be −20 to 200')
    .max(200, 'must be −20 to 200')
    .refine((value) => Math.abs(value * 10 - Math.round(value * 10)) < 1e-6, 'must have at most one decimal')
    .describe(
      'dB, or of tonalShare per cent, of eventCount events; exceeded when what is measured, rounded half up to tenths, is greater',
    ),
};

export type CheckedMetric = z.output<z.ZodObject<typeof metricFields>> & {
  window: LimitWindowName;
  stepMinutes: number | null;
};
type Issue = [field: keyof CheckedMetric, message: string];

/** What does not go together of what a limit is about. */
export function metricIssues(limit: CheckedMetric): Issue[] {
  return [
    ...bandIssues(limit),
    ...parameterIssues(limit),
    ...backgroundIssues(limit),
    ...windowIssues(limit),
    ...thresholdIssues(limit),
  ];
}

function backgroundIssues({ metric, percent, backgroundFrom, backgroundTo }: CheckedMetric): Issue[] {
  if (metric !== 'LAeqLessLA90')
    return backgroundFrom === null && backgroundTo === null
      ? []
      : [['backgroundFrom', 'goes with a level above the background only']];
  const issues: Issue[] = [];
  if (percent !== null && !BACKGROUND_PERCENTS.some((one) => one === percent))
    issues.push(['percent', `must be ${BACKGROUND_PERCENTS.join(' or ')} of a background`]);
  if ((backgroundFrom === null) !== (backgroundTo === null))
    return [
      ...issues,
      [
        backgroundFrom === null ? 'backgroundFrom' : 'backgroundTo',
        'must be given together with the other one',
      ],
    ];
  if (backgroundFrom === null || backgroundTo === null) return issues;
  if (backgroundFrom === backgroundTo) issues.push(['backgroundTo', 'must differ from the beginning']);
  if (backgroundFrom === 1440) issues.push(['backgroundFrom', 'must be from 00:00 to 23:59']);
  if (backgroundFrom % GRAIN_MIN !== 0 || backgroundTo % GRAIN_MIN !== 0)
    issues.push(['backgroundFrom', `must be in steps of ${GRAIN_MIN} minutes, like the end`]);
  return issues;
}

function bandIssues({ metric, bandHz, bandFraction, bandToHz }: CheckedMetric): Issue[] {
  const isGroup = metric === 'bandGroupLeq';
  if (metric !== 'bandLeq' && !isGroup)
    return bandHz === null && bandFraction === null && bandToHz === null
      ? []
      : [['bandHz', 'goes with the level of bands only']];
  if (bandFraction === null) return [['bandFraction', 'must be given for a band: 1 (octaves) or 3 (thirds)']];
  const nominal = `must be the nominal frequency of ${bandFraction === 3 ? 'a third' : 'an octave'}`;
  const issues: Issue[] = [];
  if (bandHz === null) issues.push(['bandHz', 'must be given for a band']);
  else if (!bandByNominalHz(bandFraction, bandHz)) issues.push(['bandHz', nominal]);
  if (!isGroup) return bandToHz === null ? issues : [...issues, ['bandToHz', 'goes with several bands only']];
  if (bandToHz === null) issues.push(['bandToHz', 'must be given for several bands']);
  else if (!bandByNominalHz(bandFraction, bandToHz)) issues.push(['bandToHz', nominal]);
  else if (bandHz !== null && bandToHz <= bandHz) issues.push(['bandToHz', 'must be above the first band']);
  return issues;
}

function parameterIssues({
  metric,
  percent,
  eventThreshold,
  eventSeconds,
  eventGap,
}: CheckedMetric): Issue[] {
  const issues: Issue[] = [];
  if (metric === 'LAN' && percent === null) issues.push(['percent', 'must be given for an L_N']);
  if (metric !== 'LAN' && metric !== 'LAeqLessLA90' && percent !== null)
    issues.push(['percent', 'goes with an L_N or a background only']);
  const isOfEvents = EVENT_METRICS.includes(metric);
  if (!isOfEvents && eventGap !== null) issues.push(['eventGap', 'goes with events only']);
  for (const [field, value] of [
    ['eventThreshold', eventThreshold],
    ['eventSeconds', eventSeconds],
  ] as const) {
    if (isOfEvents && value === null) issues.push([field, 'must be given for events']);
    if (!isOfEvents && value !== null) issues.push([field, 'goes with events only']);
  }
  return issues;
}

function windowIssues({ metric, window, stepMinutes }: CheckedMetric): Issue[] {
  const issues: Issue[] = [];
  if (metric === 'Lden' && window !== 'den')
    issues.push(['window', 'must be the date’s day, evening and night for Lden']);
  if (metric !== 'Lden' && window === 'den') issues.push(['window', 'goes with Lden only']);
  if (stepMinutes !== null && FIXED_ONLY.includes(metric))
    issues.push(['stepMinutes', 'does not go with this quantity: its windows follow one another']);
  return issues;
}

function thresholdIssues({ metric, threshold }: CheckedMetric): Issue[] {
  if (metric === 'tonalShare' && (threshold < 0 || threshold >= 100))
    return [['threshold', 'must be at least 0 and less than 100 per cent']];
  if (metric === 'eventCount' && (threshold < 0 || !Number.isInteger(threshold)))
    return [['threshold', 'must be a whole number of events']];
  return [];
}
