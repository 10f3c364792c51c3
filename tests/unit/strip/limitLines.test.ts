import { describe, expect, it } from 'vitest';
import { DEFAULT_SCHEME } from '#lib/acoustics/dayEveningNight';
import { timesOfValidity, type StripLimit } from '../../../src/components/strip/model/limitLines';

const sec = (iso: string) => Date.parse(iso) / 1000;
const limit: StripLimit = {
  id: 1,
  name: 'Night',
  metric: 'LAeq',
  averaging: '1h',
  windowMin: null,
  stepMin: null,
  thresholdDb: 55,
  weekdays: 127,
  holidays: 'as-weekday',
  holidayDates: new Set(['2026-03-17']),
  fromMin: 23 * 60,
  toMin: 7 * 60,
  effectiveFromSec: 0,
  effectiveToSec: null,
};
const view = { fromSec: sec('2026-03-17T12:00Z'), toSec: sec('2026-03-19T00:00Z') };
const london = { effectiveFromSec: 0, timeZone: 'Europe/London', scheme: DEFAULT_SCHEME };
const times = (changes: Partial<StripLimit>, at = view, clocks = [london]) =>
  timesOfValidity({ ...limit, ...changes }, at, clocks).map((run) =>
    [run.fromSec, run.toSec].map((s) => new Date(s * 1000).toISOString().slice(5, 16)),
  );

describe('when a limit holds', () => {
  it('crosses midnight', () => {
    expect(times({})).toEqual([
      ['03-17T23:00', '03-18T07:00'],
      ['03-18T23:00', '03-19T00:00'],
    ]);
  });

  it('is one stretch where it holds all day', () => {
    expect(times({ fromMin: null, toMin: null })).toEqual([['03-17T12:00', '03-19T00:00']]);
  });

  it('is its own hours, or all of the windows of any length that begin in them', () => {
    const hours = { averaging: 'hours', fromMin: 22 * 60, toMin: 6 * 60 } as const;
    expect(times(hours)[0]).toEqual(['03-17T22:00', '03-18T06:00']);
    expect(times({ ...hours, averaging: 'length', windowMin: 30 })).toEqual(times(hours));
    const rolling = times({ ...hours, averaging: 'length', windowMin: 30, stepMin: 5 });
    expect(rolling[0]).toEqual(['03-17T22:00', '03-18T06:25']);
  });

  it('takes the named dates as the limit does', () => {
    const night = [['03-17T23:00', '03-18T00:00']];
    expect(times({ holidays: 'only' })).toEqual(night);
    expect(times({ holidays: 'never' })).toEqual([
      ['03-18T00:00', '03-18T07:00'],
      ['03-18T23:00', '03-19T00:00'],
    ]);
    // Sundays alone (bit 6): the Tuesday is one by its name.
    expect(times({ holidays: 'as-sunday', weekdays: 1 << 6 })).toEqual(night);
    expect(times({ weekdays: 1 << 6 })).toEqual([]);
  });

  it('goes by the clock that the network had at the time', () => {
    const before = { ...london, timeZone: 'America/New_York' };
    const clocks = [before, { ...london, effectiveFromSec: sec('2026-03-18T00:00Z') }];
    expect(times({}, view, clocks)).toEqual([
      ['03-18T00:00', '03-18T07:00'],
      ['03-18T23:00', '03-19T00:00'],
    ]);
  });

  it('keeps to the weekdays on which its windows begin', () => {
    // 17 March 2026 is a Tuesday (bit 1).
    expect(times({ weekdays: 1 << 1 })).toEqual([['03-17T23:00', '03-18T00:00']]);
    expect(times({ weekdays: 1 << 4 })).toEqual([]);
  });

  it('follows the periods of day, an hour shorter in the night of the spring change', () => {
    const spring = { fromSec: sec('2026-03-28T12:00Z'), toSec: sec('2026-03-29T12:00Z') };
    expect(times({ averaging: 'night', fromMin: null, toMin: null }, spring)).toEqual([
      ['03-28T23:00', '03-29T06:00'],
    ]);
  });

  it('begins and ends with the version', () => {
    expect(
      times({
        fromMin: null,
        toMin: null,
        effectiveFromSec: sec('2026-03-18T00:00Z'),
        effectiveToSec: sec('2026-03-18T06:00Z'),
      }),
    ).toEqual([['03-18T00:00', '03-18T06:00']]);
  });
});
