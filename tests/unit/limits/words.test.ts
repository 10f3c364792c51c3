import { expect, test } from 'vitest';
import { hoursOf, weekdaysWords, whenWords } from '../../../src/components/limits/words';

const SCHEME = { dayStartMin: 420, eveningStartMin: 1140, nightStartMin: 1380 };

test('weekdays are told as runs', () => {
  expect(weekdaysWords(['mon', 'tue', 'wed', 'thu', 'fri', 'sat', 'sun'])).toBe('every day');
  expect(weekdaysWords(['mon', 'tue', 'wed', 'thu', 'fri'])).toBe('Mon–Fri');
  expect(weekdaysWords(['sat', 'sun'])).toBe('Sat, Sun');
  expect(weekdaysWords(['mon', 'wed', 'thu', 'fri', 'sun'])).toBe('Mon, Wed–Fri, Sun');
});

test('hours of a period are the network’s; without an evening the day goes on until the night', () => {
  expect(hoursOf('night', SCHEME)).toBe('23:00–07:00');
  expect(hoursOf('day', { ...SCHEME, eveningStartMin: null })).toBe('07:00–23:00');
  expect(hoursOf('evening', { ...SCHEME, eveningStartMin: null })).toBeNull();
});

test('when a limit holds', () => {
  const weekdays = ['sat', 'sun'] as ('sat' | 'sun')[];
  expect(whenWords({ weekdays, holidays: 'as-weekday', window: '1h', from: null, to: null }, SCHEME)).toBe(
    'Sat, Sun, all day',
  );
  expect(
    whenWords({ weekdays, holidays: 'as-weekday', window: '15min', from: '22:00', to: '06:00' }, SCHEME),
  ).toBe('Sat, Sun, 22:00–06:00');
  expect(
    whenWords({ weekdays, holidays: 'never', window: 'hours', from: '22:00', to: '06:00' }, SCHEME),
  ).toBe('Sat, Sun, not on holidays, 22:00–06:00');
  expect(whenWords({ weekdays, holidays: 'as-weekday', window: 'night', from: null, to: null }, SCHEME)).toBe(
    'Sat, Sun, night (23:00–07:00)',
  );
});
