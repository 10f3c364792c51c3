import { describe, expect, test } from 'vitest';
import { civilHours, skippedHours } from '#lib/services/figures/civilHours';
import { startOfDaySec } from '#lib/time/zone';

const dateSpan = (date: string, next: string, zone: string) => ({
  fromSec: startOfDaySec(date, zone),
  toSec: startOfDaySec(next, zone),
});

describe('hours of the clock on the wall', () => {
  test('tile any period and stay within it', () => {
    const span = { fromSec: 1_700_000_123, toSec: 1_700_090_456 };
    const hours = civilHours(span, 'Asia/Kathmandu');
    expect(hours[0]?.fromSec).toBe(span.fromSec);
    expect(hours.at(-1)?.toSec).toBe(span.toSec);
    for (const [at, hour] of hours.slice(1).entries()) expect(hour.fromSec).toBe(hours[at]?.toSec);
  });

  test('come twice in autumn and are left out in spring', () => {
    const autumn = civilHours(dateSpan('2026-10-25', '2026-10-26', 'Europe/Berlin'), 'Europe/Berlin');
    expect(autumn.filter(({ hour }) => hour === 2).map(({ turn }) => turn)).toEqual([0, 1]);
    expect(autumn).toHaveLength(25);
    expect(civilHours(dateSpan('2026-03-29', '2026-03-30', 'Europe/Berlin'), 'Europe/Berlin')).toHaveLength(
      23,
    );
    expect(skippedHours('2026-03-29', 'Europe/Berlin')).toEqual([2]);
    expect(skippedHours('2026-10-25', 'Europe/Berlin')).toEqual([]);
  });

  test('of a change by half an hour are one and a half, or a half', () => {
    const zone = 'Australia/Lord_Howe';
    const autumn = civilHours(dateSpan('2026-04-05', '2026-04-06', zone), zone);
    const length = (hour: number, turn: number) =>
      autumn
        .filter((one) => one.hour === hour && one.turn === turn)
        .map(({ fromSec, toSec }) => (toSec - fromSec) / 60);
    expect([length(1, 0), length(1, 1), length(2, 0)]).toEqual([[60], [30], [60]]);
    const spring = civilHours(dateSpan('2026-10-04', '2026-10-05', zone), zone);
    expect(spring.filter(({ hour }) => hour === 2).map(({ fromSec, toSec }) => toSec - fromSec)).toEqual([
      1800,
    ]);
    expect(skippedHours('2026-10-04', zone)).toEqual([]);
  });
});
