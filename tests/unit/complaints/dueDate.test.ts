import { expect, test } from 'vitest';
import { addWorkingDays } from '#lib/services/complaints/dueDate';

test.each([
  ['a Monday', '2026-03-16', '2026-03-30'],
  ['a Friday', '2026-03-20', '2026-04-03'],
  ['a Saturday', '2026-03-21', '2026-04-03'],
  ['a Sunday', '2026-03-22', '2026-04-03'],
  ['the turn of a year (public holidays are not known)', '2026-12-24', '2027-01-07'],
])('ten working days after %s', (_, logged, due) => {
  expect(addWorkingDays(logged, 10)).toBe(due);
});
