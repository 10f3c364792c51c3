import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { FLAGS } from '#lib/acoustics/validity';
import { DEFAULT_THRESHOLDS } from '#lib/contracts/health';
import { clockRule, coverageRule, lateRule, silentRule } from '#lib/services/health/arrivalRules';
import { bandsRule, batteryRule, frozenRule, windRule } from '#lib/services/health/contentRules';
import { flagsRule } from '#lib/services/health/flagsRule';
import { type IntervalEvidence, type StationEvidence } from '#lib/services/health/evidence';
import { judgeStation } from '#lib/services/health/judge';
import { receivedShare } from '#lib/services/health/readEvidence';

const NOW_SEC = 1_780_000_020;

/** Minutes before `NOW_SEC`, ascending, as a healthy station sends them. */
function minutes(
  count: number,
  change: (at: number) => Partial<IntervalEvidence> = () => ({}),
): IntervalEvidence[] {
  return Array.from({ length: count }, (_, at) => {
    const startSec = NOW_SEC - 60 * (count - at);
    return {
      startSec,
      durationSec: 60,
      fingerprint: String(at),
      isInconsistent: false,
      batteryV: 12.4,
      isCheck: false,
      flags: 0,
      receivedAtSec: startSec + 65,
      ...change(at),
    };
  });
}

const station = (changes: Partial<StationEvidence> = {}): StationEvidence => ({
  nowSec: NOW_SEC,
  intervalSec: 60,
  thresholds: DEFAULT_THRESHOLDS,
  expectedFlags: FLAGS.rain,
  newestEndSec: NOW_SEC,
  lastPostSec: NOW_SEC,
  intervals: minutes(60),
  clockAheadSec: 0.4,
  refusedAheadCount: 0,
  received24h: 1,
  floorDb: { lastDay: 32, usual: 31 },
  wind: { count: 360, firstSec: NOW_SEC - 6 * 3600, leastMs: 0.5, mostMs: 4 },
  ...changes,
});

test('nothing is wrong with a healthy station, and nothing is said of one that has never posted', () => {
  const states = [...judgeStation(station(), new Map()).values()].map(({ state }) => state);
  expect(new Set(states)).toEqual(new Set(['fine']));
  const unseen = station({
    newestEndSec: null,
    lastPostSec: null,
    intervals: [],
    received24h: null,
    clockAheadSec: null,
  });
  const found = [...judgeStation(unseen, new Map()).values()];
  expect(found.some(({ state }) => state === 'bad')).toBe(false);
});

describe('silent and late', () => {
  test('a gap up to the bound is no silence, one above it is, whatever the station’s interval', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(1, 60, 900, 3600),
        fc.integer({ min: 0, max: 20_000 }),
        (intervalSec, gapSec) => {
          const endSec = NOW_SEC - gapSec;
          const found = silentRule(station({ intervalSec, newestEndSec: endSec, lastPostSec: endSec }), null);
          const isSilent = gapSec > Math.max(900, 3 * intervalSec);
          expect(found).toMatchObject(isSilent ? { state: 'bad', sinceSec: endSec } : { state: 'fine' });
        },
      ),
    );
  });

  test('posts of old data are late, not silent; they do not end a silence until newer data come', () => {
    const catchingUp = station({ newestEndSec: NOW_SEC - 7200, lastPostSec: NOW_SEC - 30 });
    expect(silentRule(catchingUp, null).state).toBe('fine');
    expect(lateRule(catchingUp, null)).toMatchObject({ state: 'bad', measured: 7200 });
    expect(silentRule(catchingUp, NOW_SEC - 7200).state).toBe('bad');
    expect(silentRule(catchingUp, NOW_SEC - 9000).state).toBe('fine');
  });

  test('of a silent station nothing else is said', () => {
    const silent = station({
      newestEndSec: NOW_SEC - 7200,
      lastPostSec: NOW_SEC - 7200,
      received24h: 0.1,
      intervals: minutes(60, () => ({ batteryV: 9 })),
    });
    const bad = [...judgeStation(silent, new Map())].filter(([, { state }]) => state === 'bad');
    expect(bad.map(([kind]) => kind)).toEqual(['silent']);
  });
});

test('coverage is told below its bound, and over only a little above it', () => {
  const at = (received24h: number, isOpen: boolean) =>
    coverageRule(station({ received24h }), isOpen ? 1 : null).state;
  expect([at(0.9, false), at(0.899, false), at(0.91, true), at(0.93, true)]).toEqual([
    'fine',
    'bad',
    'bad',
    'fine',
  ]);
});

test('a clock is off by the time that the monitor sends, by data from the future, or by what was refused for it', () => {
  const found = (changes: Partial<StationEvidence>) => clockRule(station(changes), null);
  expect(found({ clockAheadSec: -60 }).state).toBe('fine');
  expect(found({ clockAheadSec: -61 })).toMatchObject({ state: 'bad', measured: -61 });
  const ahead = minutes(60, (at) => ({ receivedAtSec: NOW_SEC - 60 * (60 - at) + 60 - 90 }));
  expect(found({ clockAheadSec: null, intervals: ahead })).toMatchObject({ state: 'bad', measured: 90 });
  expect(found({ clockAheadSec: null, refusedAheadCount: 2 })).toMatchObject({
    state: 'bad',
    measured: null,
  });
});

describe('battery', () => {
  test('one reading under load is none', () => {
    const dip = minutes(60, (at) => ({ batteryV: at === 30 ? 9 : 12 }));
    expect(batteryRule(station({ intervals: dip }), null).state).toBe('fine');
  });

  test('is told since it fell, and over only a little above the bound', () => {
    const falling = minutes(60, (at) => ({ batteryV: at < 20 ? 12 : 11.7 }));
    expect(batteryRule(station({ intervals: falling }), null)).toMatchObject({
      state: 'bad',
      sinceSec: falling[20]?.startSec,
      measured: 11.7,
    });
    const risen = minutes(60, () => ({ batteryV: 11.9 }));
    expect(batteryRule(station({ intervals: risen }), 1).state).toBe('bad');
    expect(batteryRule(station({ intervals: risen }), null).state).toBe('fine');
  });
});

describe('frozen', () => {
  test('a run of the very same levels is told from its first interval on, gaps or not, when it lasts long enough', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 60 }),
        fc.array(fc.integer({ min: 0, max: 59 })),
        (length, missing) => {
          const all = minutes(60, (at) => (at >= 60 - length ? { fingerprint: 'same' } : {}));
          const intervals = all.filter((_, at) => !missing.includes(at));
          const run = intervals.filter(({ fingerprint }) => fingerprint === 'same');
          const found = frozenRule(station({ intervals }), null);
          if (intervals.length === 0) expect(found.state).toBe('unknown');
          else if (run.length < 15) expect(found.state).toBe('fine');
          else expect(found).toMatchObject({ state: 'bad', sinceSec: run[0]?.startSec });
        },
      ),
    );
  });

  test('a calibrator is steady by intent', () => {
    const check = minutes(60, (at) => (at < 30 ? {} : { fingerprint: 'same', isCheck: true }));
    expect(frozenRule(station({ intervals: check }), null).state).toBe('fine');
  });
});

test('bands that contradict LAeq are told when more than half of the intervals do', () => {
  const with_ = (bad: number) =>
    bandsRule(station({ intervals: minutes(60, (at) => ({ isInconsistent: at < bad })) }), null).state;
  expect([with_(0), with_(30), with_(31)]).toEqual(['fine', 'fine', 'bad']);
  const octaveless = minutes(60, () => ({ isInconsistent: null }));
  expect(bandsRule(station({ intervals: octaveless }), null).state).toBe('fine');
});

test('a wind sensor is stuck when the whole stretch has one value; a calm has to last four times as long', () => {
  const at = (speedMs: number, hours: number) =>
    windRule(
      station({
        wind: { count: hours * 60, firstSec: NOW_SEC - hours * 3600, leastMs: speedMs, mostMs: speedMs },
      }),
      null,
    ).state;
  expect([at(2.3, 6), at(2.3, 3), at(0, 6), at(0, 24)]).toEqual(['bad', 'fine', 'fine', 'bad']);
});

test('of a station that has just begun, coverage counts since its first data', () => {
  const quarters = Array.from({ length: 8 }, () => ({ validSec: 880, excludedSec: 20 }));
  expect(receivedShare(quarters, NOW_SEC, NOW_SEC - 7200)).toBe(1);
  expect(receivedShare(quarters, NOW_SEC, NOW_SEC - 10 * 86_400)).toBeCloseTo(1 / 12);
  expect(receivedShare([], NOW_SEC, null)).toBeNull();
  expect(receivedShare([], NOW_SEC, NOW_SEC - 1800)).toBeNull();
});

describe('flags', () => {
  const flagged = (flag: number, isOften: (at: number) => boolean) =>
    station({ intervals: minutes(60, (at) => ({ flags: isOften(at) ? flag : 0 })) });

  test('that are expected, or pass, are no trouble; others that come often are, and are named', () => {
    expect(
      flagsRule(
        flagged(FLAGS.rain, () => true),
        null,
      ).state,
    ).toBe('fine');
    expect(
      flagsRule(
        flagged(FLAGS.tamper, (at) => at === 7),
        null,
      ).state,
    ).toBe('fine');
    const both = FLAGS.tamper | FLAGS.rain;
    const finding = flagsRule(
      flagged(both, (at) => at >= 50),
      null,
    );
    expect(finding).toEqual({
      state: 'bad',
      sinceSec: NOW_SEC - 600,
      measured: FLAGS.tamper,
      bound: 0.1,
    });
  });

  test('once found, they are over only when they have become rare', () => {
    const fewer = flagged(FLAGS.overload, (at) => at >= 56);
    expect(flagsRule(fewer, null).state).toBe('fine');
    expect(flagsRule(fewer, NOW_SEC - 7200).state).toBe('bad');
  });
});
