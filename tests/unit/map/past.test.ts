import { describe, expect, it } from 'vitest';
import type { NetworkLevels } from '#lib/contracts/networkMap';
import type { Station } from '#lib/contracts/stations';
import { readUrlMoment } from '#lib/time/urlMoment';
import { dayOf, sameClockOn } from '../../../src/components/map/model/day';
import { stationsAsOf, stationsInUse } from '../../../src/components/map/model/shownStation';
import { markStateOf, stateLine, stationSentence } from '../../../src/components/map/model/stationWords';

const ZONE = 'Europe/London';
const sec = (text: string) => Date.parse(text) / 1000;
const station = (code: string) =>
  ({ code, name: code, intervalSeconds: 60, state: 'live', retiredAt: null }) as Station;
const levels: NetworkLevels = {
  from: '2026-03-17T00:00:00Z',
  to: '2026-03-17T00:30:00Z',
  stepSeconds: 900,
  minimumCoverage: 0.75,
  stations: [
    {
      station: 'A',
      LAeq: [null, 52.34],
      validSeconds: [0, 450],
      exceeded: [{ from: '2026-03-17T00:15:00Z', to: '2026-03-17T01:15:00Z' }],
    },
  ],
};

describe('stations as of a past quarter-hour', () => {
  it('have its level, its coverage and whether a limit stood exceeded', () => {
    const [a] = stationsAsOf([station('A')], levels, sec('2026-03-17T00:15:00Z'));
    expect(a?.past).toMatchObject({ coverage: 0.5, meetsMinimum: false });
    expect(a && markStateOf(a)).toBe('over-limit');
    expect(a && stationSentence(a, ZONE, 0)).toBe(
      'A, A: LAeq,15 min 52.3 dB, over a limit, 00:15 to 00:30, 50\u00a0% valid, not enough to compare.',
    );
  });

  it('have nothing where nothing was measured, or the station is not among the levels', () => {
    const shown = stationsAsOf([station('A'), station('B')], levels, sec('2026-03-17T00:00:00Z'));
    expect(shown.map((one) => [one.state, one.latest])).toEqual([
      ['silent', null],
      ['silent', null],
    ]);
  });
});

describe('a retired station', () => {
  const retired = (code: string, at: string) =>
    ({ ...station(code), state: 'retired', retiredAt: at }) as Station;
  const at = sec('2026-03-17T00:15:00Z');
  const codes = (stations: Station[]) => stationsAsOf(stations, levels, at).map(({ code }) => code);

  it('is on the map of a moment when it was in service, with or without data', () => {
    expect(codes([retired('A', '2026-05-01T00:00:00Z'), retired('B', '2026-03-17T00:20:00Z')])).toEqual([
      'A',
      'B',
    ]);
    const [a] = stationsAsOf([retired('A', '2026-05-01T00:00:00Z')], levels, at);
    expect(a && stateLine(a, ZONE, 0)).toBe('50\u00a0% valid, not enough to compare; retired since');
  });

  it('is not on maps of later moments, unless it still measured', () => {
    expect(codes([retired('B', '2026-03-17T00:15:00Z'), retired('A', '2026-03-16T00:00:00Z')])).toEqual([
      'A',
    ]);
    expect(
      stationsInUse([retired('B', '2026-03-17T00:15:00Z'), station('A')]).map(({ code }) => code),
    ).toEqual(['A']);
  });
});

describe('the day that is scrubbed', () => {
  it('has 23 hours where the clock is put forward', () => {
    const { fromSec, toSec, isToday } = dayOf(sec('2026-03-29T12:00:00Z'), ZONE, sec('2026-06-01T00:00:00Z'));
    expect([(toSec - fromSec) / 3600, isToday]).toEqual([23, false]);
  });

  it('ends with the last quarter-hour that has passed', () => {
    const now = sec('2026-03-17T12:07:00Z');
    expect(dayOf(now, ZONE, now)).toMatchObject({ toSec: sec('2026-03-17T12:00:00Z'), isToday: true });
  });

  it('keeps the time on the clock when another date is chosen; what has not passed is now', () => {
    const [at, now] = [sec('2026-03-17T12:15:00Z'), sec('2026-07-02T09:00:00Z')];
    expect(sameClockOn('2026-07-01', at, ZONE, now)).toBe(sec('2026-07-01T11:15:00Z'));
    expect(sameClockOn('2026-07-02', at, ZONE, now)).toBeNull();
    expect(sameClockOn('', at, ZONE, now)).toBeNull();
  });
});

it('an address names a quarter-hour that has passed, or says why not', () => {
  const now = sec('2026-03-17T12:07:00Z');
  expect(readUrlMoment('2026-03-17T11:50', ZONE, now).sec).toBe(sec('2026-03-17T11:45:00Z'));
  expect(readUrlMoment('2026-03-17T12:01', ZONE, now)).toMatchObject({
    sec: null,
    problem: expect.stringMatching('not passed'),
  });
  expect(readUrlMoment('soon', ZONE, now)).toMatchObject({
    sec: null,
    problem: expect.stringMatching('could not'),
  });
});
