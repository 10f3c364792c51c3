import { expect, test } from 'vitest';
import { diskForecast } from '#lib/services/operation/diskForecast';

const GIB = 2 ** 30;
const sample = (day: number, usedGib: number) => ({
  takenAt: new Date(Date.UTC(2026, 2, 1) + day * 86_400_000),
  totalBytes: 100 * GIB,
  freeBytes: (100 - usedGib) * GIB,
});

test('two gibibytes a day on forty free ones last twenty days', () => {
  const samples = Array.from({ length: 10 }, (_, day) => sample(day, 42 + 2 * day));
  expect(diskForecast(samples)).toEqual({
    totalBytes: 100 * GIB,
    freeBytes: 40 * GIB,
    bytesADay: 2 * GIB,
    daysLeft: 20,
  });
});

test('backups that come and go do not decide it: the line through all samples does', () => {
  const samples = Array.from({ length: 28 }, (_, day) => sample(day, 40 + day / 2 + (day % 7 === 0 ? 5 : 0)));
  const forecast = diskForecast(samples);
  expect((forecast?.bytesADay ?? 0) / GIB).toBeGreaterThan(0.3);
  expect((forecast?.bytesADay ?? 0) / GIB).toBeLessThan(0.6);
});

test('no forecast from less than three days, from a disk that empties, or from nothing', () => {
  expect(diskForecast([sample(0, 10), sample(2, 30)])).toMatchObject({ bytesADay: null, daysLeft: null });
  expect(diskForecast([sample(0, 50), sample(5, 40)])).toMatchObject({ daysLeft: null });
  expect(diskForecast([])).toBeNull();
});
