import fc from 'fast-check';
import { expect, test } from 'vitest';
import { bandsOf } from '#lib/acoustics/bands';
import { needsNoCoverage, type LimitMetricName } from '#lib/acoustics/limitQuantities';
import { formatClockTime } from '#lib/contracts/common';
import { newLimitSchema, WEEKDAYS, type Limit } from '#lib/contracts/limits';
import { HOLIDAY_RULES } from '#lib/contracts/limitWindows';
import { limitOfForm, limitValues } from '../../../src/pages/n/[network]/limits/_limitForm';

const ZONE = 'Europe/London';

const band = fc
  .constantFrom(1 as const, 3 as const)
  .chain((fraction) =>
    fc
      .constantFrom(...bandsOf(fraction))
      .map(({ nominalHz }) => ({ bandFraction: fraction, bandHz: nominalHz })),
  );
const quantity = fc.oneof(
  fc.constantFrom({ metric: 'LAeq' } as const, { metric: 'LAFmax' } as const),
  band.map((one) => ({ metric: 'bandLeq' as const, ...one })),
  fc.constantFrom(
    { metric: 'LAE' },
    { metric: 'LAeqLessLA90', percent: 95, backgroundFrom: '23:00', backgroundTo: '05:00' },
    { metric: 'eventCount', eventThreshold: 65.5, eventSeconds: 5, eventGap: 0 },
    { metric: 'eventLAE', eventThreshold: 70, eventSeconds: 1, eventGap: 30 },
    { metric: 'LAN', percent: 90 },
    { metric: 'bandGroupLeq', bandFraction: 3, bandHz: 50, bandToHz: 200 },
  ),
);
const hours = fc
  .tuple(fc.integer({ min: 0, max: 1439 }), fc.integer({ min: 0, max: 1439 }))
  .filter(([from, to]) => from !== to)
  .map(([from, to]) => ({ from: formatClockTime(from), to: formatClockTime(to) }));
const fives = hours.filter(({ from, to }) => /[05]$/.test(from) && /[05]$/.test(to));
const windows = fc.oneof(
  fc.constantFrom('day', 'evening', 'night').map((window) => ({ window })),
  fives.map((times) => ({ window: 'hours', ...times })),
  fc.tuple(fc.constantFrom(5, 20, 120, 1440), fc.constantFrom(5, 15, null)).map(([windowMinutes, step]) => ({
    window: 'length',
    windowMinutes,
    stepMinutes: step !== null && step < windowMinutes ? step : null,
  })),
  fc
    .tuple(fc.constantFrom('15min', '1h'), fc.option(hours, { nil: { from: null, to: null } }))
    .map(([window, times]) => ({ window, ...times })),
);

const speed = fc.option(fc.integer({ min: 0, max: 400 }).map((tenths) => tenths / 10));
const wind = fc
  .record({
    speeds: fc.tuple(speed, speed),
    sector: fc.option(fc.tuple(fc.integer({ min: 0, max: 359 }), fc.integer({ min: 0, max: 359 }))),
    windDismissAbove: speed,
    windUnknown: fc.constantFrom('left-out', 'counts'),
  })
  .map(({ speeds: [one, other], sector, ...rest }) => ({
    ...rest,
    windMinimum: one !== null && other !== null ? Math.min(one, other) : one,
    windMaximum: one !== null && other !== null ? Math.max(one, other) : other,
    windFrom: sector?.[0] ?? null,
    windTo: sector?.[1] ?? null,
  }));

const places = fc.oneof(
  fc
    .option(fc.subarray(['A-1', 'B-2', 'C-3'], { minLength: 1 }))
    .map((stations) => ({ stations, group: null })),
  fc.integer({ min: 1, max: 99 }).map((group) => ({ stations: null, group })),
);

/** A limit as the interface shows it. */
const limits = fc
  .record({
    threshold: fc.integer({ min: -200, max: 2000 }).map((tenths) => tenths / 10),
    weekdays: fc
      .subarray([...WEEKDAYS], { minLength: 1 })
      .map((days) => WEEKDAYS.filter((day) => days.includes(day))),
    coverage: fc.option(fc.integer({ min: 0, max: 100 })),
    holidays: fc.constantFrom(...HOLIDAY_RULES),
    where: places,
    recipients: fc.subarray(['a@x.example', 'b+c@y.example']),
    quantity,
    windows,
    wind,
  })
  .map(
    ({ quantity: what, windows: when, wind: itsWind, where, coverage, threshold, ...rest }) =>
      ({
        name: 'Any',
        reason: 'Said before',
        bandHz: null,
        bandToHz: null,
        bandFraction: null,
        eventThreshold: null,
        eventSeconds: null,
        eventGap: null,
        percent: null,
        backgroundFrom: null,
        backgroundTo: null,
        from: null,
        to: null,
        windowMinutes: null,
        stepMinutes: null,
        ...what,
        ...when,
        // Events have windows that follow one another.
        ...('eventSeconds' in what && { stepMinutes: null }),
        ...itsWind,
        ...where,
        ...rest,
        threshold: what.metric === 'eventCount' ? Math.abs(Math.round(threshold)) : threshold,
        minimumCoverage:
          coverage === null || needsNoCoverage(what.metric as LimitMetricName) ? null : coverage / 100,
      }) as unknown as Limit,
  );

test('a limit shown in the form and sent back unchanged is the same limit', () => {
  fc.assert(
    fc.property(limits, (limit) => {
      const sent = newLimitSchema.parse(limitOfForm(limitValues(limit, ZONE), ZONE));
      expect(sent).toEqual({ ...newLimitSchema.parse(limit), reason: '' });
    }),
  );
});

test('hours to midnight are kept, and from midnight to midnight is all day', () => {
  const limit = {
    weekdays: WEEKDAYS,
    window: '1h',
    metric: 'LAeq',
    stations: null,
    group: null,
  } as unknown as Limit;
  const evening = limitValues({ ...limit, from: '18:00', to: '24:00' }, ZONE);
  expect(evening.text).toMatchObject({ from: '18:00', to: '00:00' });
  const allDay = limitValues({ ...limit, from: '00:00', to: '24:00' }, ZONE);
  expect(allDay.text).toMatchObject({ from: '', to: '' });
});

test('fields that do not go with the other choices do not count; a decimal comma does', () => {
  const typed = {
    metric: 'LAFmax',
    window: '1h',
    band: '3:100',
    threshold: '80,5',
    minimumCoverage: '90',
    scope: 'all',
    recipients: 'a@x.example,\n b@x.example;',
    effectiveFrom: '2026-07-01T12:00',
  };
  const limit = limitOfForm({ text: typed, all: () => ['mon'] }, ZONE);
  expect(limit).toMatchObject({
    threshold: 80.5,
    minimumCoverage: null,
    stations: null,
    recipients: ['a@x.example', 'b@x.example'],
    effectiveFrom: '2026-07-01T11:00:00Z',
  });
  expect(limit).not.toHaveProperty('bandHz');
});
