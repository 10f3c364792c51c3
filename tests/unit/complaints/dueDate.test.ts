import { describe, expect, test } from 'vitest';
import { addWorkingDays } from '#lib/services/complaints/dueDate';

const MONDAY_TO_FRIDAY = { weekdays: new Set([0, 1, 2, 3, 4]), holidays: new Set<string>() };

describe('ten working days, Monday to Friday', () => {
  test.each([
    ['a Monday', '2026-03-16', '2026-03-30'],
    ['a Friday', '2026-03-20', '2026-04-03'],
    ['a Saturday', '2026-03-21', '2026-04-03'],
    ['a Sunday', '2026-03-22', '2026-04-03'],
    ['the turn of a year without named dates', '2026-12-24', '2027-01-07'],
  ])('after %s', (_, logged, due) => {
    expect(addWorkingDays(logged, 10, MONDAY_TO_FRIDAY)).toBe(due);
  });
});

test('named dates are no working days; on a weekend they change nothing', () => {
  const holidays = new Set(['2026-12-25', '2026-12-26', '2026-12-28', '2027-01-01']);
  expect(addWorkingDays('2026-12-24', 10, { ...MONDAY_TO_FRIDAY, holidays })).toBe('2027-01-12');
});

test('a network that works from Sunday to Thursday', () => {
  const calendar = { weekdays: new Set([6, 0, 1, 2, 3]), holidays: new Set<string>() };
  expect(addWorkingDays('2026-03-19', 1, calendar)).toBe('2026-03-22');
  expect(addWorkingDays('2026-03-16', 5, calendar)).toBe('2026-03-23');
});

test('a calendar whose every date is named ends the search', () => {
  const everyDay = { weekdays: new Set([0]), holidays: { has: () => true } as unknown as Set<string> };
  expect(addWorkingDays('2026-03-16', 1, everyDay)).toBe('2029-03-18');
});
