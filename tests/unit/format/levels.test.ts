import { describe, expect, it } from 'vitest';
import { formatCoverage, formatDifferenceDb, formatLevelDb } from '#lib/format/levels';

describe('levels for people', () => {
  it.each([
    [64.94, '64.9'],
    [64.95, '65.0'],
    [0, '0.0'],
    [-0.04, '0.0'],
    [-3, '−3.0'],
    [null, '—'],
    [undefined, '—'],
  ])('writes %s as %s', (level, text) => expect(formatLevelDb(level)).toBe(text));

  it.each([
    [0.62, '+0.6'],
    [-1.2, '−1.2'],
    [0.04, '0.0'],
  ])('writes the difference %s as %s', (difference, text) =>
    expect(formatDifferenceDb(difference)).toBe(text),
  );

  it.each([
    [1, '100\u00a0%'],
    [0.9999, '99\u00a0%'],
    [0.7499, '74\u00a0%'],
    [0.29, '29\u00a0%'],
    [0.001, '<1\u00a0%'],
    [0, '0\u00a0%'],
  ])('never rounds coverage %s up: %s', (coverage, text) => expect(formatCoverage(coverage)).toBe(text));
});
