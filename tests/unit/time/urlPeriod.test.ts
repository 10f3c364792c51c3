import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { presetsAt, stepPeriod } from '#lib/time/periodSteps';
import { hrefOfPeriod, parseUrlInstant, readUrlPeriod, urlInstant } from '#lib/time/urlPeriod';

const LONDON = 'Europe/London';
const sec = (iso: string) => Date.parse(iso) / 1000;
const NOW_SEC = sec('2026-03-18T09:41:30Z');
const read = (query: string) => readUrlPeriod(new URL(`http://x.example/n/a/map${query}`), LONDON, NOW_SEC);

describe('the period in an address', () => {
  it('is the last 24 hours, up to the minute, where none is named', () => {
    expect(read('')).toEqual({
      fromSec: sec('2026-03-17T09:41Z'),
      toSec: sec('2026-03-18T09:41Z'),
      isDefault: true,
      problem: null,
    });
  });

  it('reads local minutes, midnight as 24:00, local dates and RFC 3339', () => {
    expect(read('?from=2026-07-01T12:00&to=2026-07-01T24:00')).toMatchObject({
      fromSec: sec('2026-07-01T11:00Z'),
      toSec: sec('2026-07-01T23:00Z'),
      isDefault: false,
    });
    expect(read('?from=2026-07-01&to=2026-07-02T00:00:00%2B02:00')).toMatchObject({
      fromSec: sec('2026-06-30T23:00Z'),
      toSec: sec('2026-07-01T22:00Z'),
    });
  });

  it.each([
    ['?from=2026-02-31T00:00&to=2026-03-02T00:00', 'The beginning of the period could not be read.'],
    ['?from=2026-03-01T00:00', 'The end of the period could not be read.'],
    ['?from=2026-03-02T00:00&to=2026-03-02T00:00', 'The period ends before it begins.'],
    ['?from=2006-03-02T00:00&to=2026-03-02T00:00', 'The period is longer than ten years.'],
  ])('says what is wrong with %s', (query, problem) => {
    expect(read(query)).toMatchObject({ isDefault: true, problem, toSec: sec('2026-03-18T09:41Z') });
  });

  it('writes an instant so that it is read back, whatever the clock does', () => {
    const zones = fc.constantFrom(LONDON, 'Australia/Lord_Howe', 'America/St_Johns', 'Asia/Kathmandu', 'UTC');
    const seconds = fc.integer({ min: sec('2024-01-01T00:00Z'), max: sec('2028-01-01T00:00Z') });
    fc.assert(
      fc.property(seconds, zones, (at, zone) => parseUrlInstant(urlInstant(at, zone), zone) === at),
      { numRuns: 500 },
    );
    for (let at = sec('2026-10-25T00:00Z'); at < sec('2026-10-25T03:00Z'); at += 900) {
      expect(parseUrlInstant(urlInstant(at, LONDON), LONDON)).toBe(at);
    }
  });

  it('keeps the other parameters of the address, but no place in a list', () => {
    const url = new URL('http://x.example/n/a/exceedances?station=MER-01&from=2026-01-01&cursor=abc');
    const period = { fromSec: sec('2026-03-17T12:00Z'), toSec: sec('2026-03-18T00:00Z') };
    expect(hrefOfPeriod(url, period, LONDON)).toBe(
      '/n/a/exceedances?station=MER-01&from=2026-03-17T12:00&to=2026-03-18T00:00',
    );
    expect(hrefOfPeriod(url, null, LONDON)).toBe('/n/a/exceedances?station=MER-01');
  });
});

describe('stepping', () => {
  const step = (from: string, to: string, direction: -1 | 1) => {
    const { fromSec, toSec } = stepPeriod({ fromSec: sec(from), toSec: sec(to) }, direction, LONDON);
    return [urlInstant(fromSec, LONDON), urlInstant(toSec, LONDON)];
  };

  it('steps whole dates over a clock change by the calendar', () => {
    expect(step('2026-03-28T00:00Z', '2026-03-29T00:00Z', 1)).toEqual([
      '2026-03-29T00:00',
      '2026-03-30T00:00',
    ]);
  });

  it('steps whole months by months', () => {
    expect(step('2026-03-01T00:00Z', '2026-03-31T23:00Z', -1)).toEqual([
      '2026-02-01T00:00',
      '2026-03-01T00:00',
    ]);
  });

  it('steps anything else by its length', () => {
    expect(step('2026-03-17T12:00Z', '2026-03-17T18:00Z', 1)).toEqual([
      '2026-03-17T18:00',
      '2026-03-18T00:00',
    ]);
  });

  it('offers whole days, weeks from Monday and months', () => {
    const spans = presetsAt(NOW_SEC, LONDON).map(
      ({ span }) => span && [urlInstant(span.fromSec, LONDON), urlInstant(span.toSec, LONDON)],
    );
    expect(spans).toEqual([
      null,
      ['2026-03-18T00:00', '2026-03-19T00:00'],
      ['2026-03-17T00:00', '2026-03-18T00:00'],
      ['2026-03-16T00:00', '2026-03-23T00:00'],
      ['2026-03-01T00:00', '2026-04-01T00:00'],
      ['2026-02-01T00:00', '2026-03-01T00:00'],
    ]);
  });
});
