import { expect, test } from 'vitest';
import { letterProblems } from '#lib/services/complaints/letter/renderLetter';
import { holidaysOfLines } from '../../../src/pages/n/[network]/limits/_holidayLines';

/**
 * Patterns that could take time by the square or the cube of what somebody types: at these lengths, which forms let through, that would be
 * from minutes to days.
 */
const LONG = 20_000;
const MOST_MS = 2_000;

test.each([
  ['a field that is not closed', () => letterProblems(`{{${' '.repeat(LONG)}`)],
  ['many fields that are not closed', () => letterProblems('{{ '.repeat(LONG / 3))],
  ['digits without end', () => letterProblems('1'.repeat(LONG))],
  ['digits and points', () => letterProblems('1.'.repeat(LONG / 2))],
  ['a level after many spaces', () => letterProblems(`1${' '.repeat(LONG)}dBx`)],
  ['a holiday of spaces', () => wrongly(() => holidaysOfLines(`2026-12-25${' '.repeat(LONG)}a\u2028b`))],
])('%s', (_, work) => {
  const startedMs = performance.now();
  work();
  expect(performance.now() - startedMs).toBeLessThan(MOST_MS);
});

function wrongly(work: () => unknown): void {
  expect(work).toThrow();
}
