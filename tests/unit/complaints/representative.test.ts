import { describe, expect, test } from 'vitest';
import type { EvidenceContext } from '#lib/contracts/complaintEvidence';
import { standingOf } from '#lib/services/complaints/pack/representative';
import { bearingDeg } from '#lib/services/complaints/whereabouts';
import { stationEvidence } from './evidenceFixture';

const context = (directionDeg: number, mean: number): EvidenceContext => ({
  rank: null,
  uncertainty: null,
  uncertaintyBasis: '',
  limits: [],
  lowFrequency: null,
  standingOut: [],
  plants: [],
  bandFraction: 3,
  bands: [],
  exclusions: [],
  flags: [],
  wind: { mean, maximum: mean, directionDeg },
  windWords: '',
});
const northEast = (distanceM: number) => ({ distanceM, wind: 'north-east' as const, bearingDeg: 45 });

describe('why a station does or does not speak for a place', () => {
  test.each([
    [500, 'near'],
    [501, 'area'],
    [1500, 'area'],
    [1501, 'far'],
  ])('at %i m: %s', (distanceM, verdict) => {
    expect(standingOf(stationEvidence(), northEast(distanceM)).verdict).toBe(verdict);
  });

  test('without data it has nothing to say, however near', () => {
    const silent = stationEvidence({ LAeq: null, coverage: 0, meetsMinimum: false });
    const { verdict, reasons } = standingOf(silent, northEast(100));
    expect(verdict).toBe('no-data');
    expect(reasons.join()).toContain('no usable measurements');
  });

  test.each([
    [60, 'from the station towards the place'],
    [230, 'from the place towards the station'],
    [135, 'across the line'],
    [350, 'across the line'],
    [5, 'from the station towards the place'],
  ])('wind from %i°, station at 45°', (directionDeg, told) => {
    const station = stationEvidence({ context: context(directionDeg, 3) });
    expect(standingOf(station, northEast(300)).reasons.at(-1)).toContain(told);
  });

  test('a breath of wind is not read', () => {
    const station = stationEvidence({ context: context(60, 0.9) });
    expect(standingOf(station, northEast(300)).reasons.join()).not.toContain('wind');
  });
});

test('bearings by the great circle', () => {
  expect(bearingDeg({ latitude: 0, longitude: 0 }, { latitude: 0, longitude: 1 })).toBeCloseTo(90, 9);
  expect(bearingDeg({ latitude: 0, longitude: 0 }, { latitude: -1, longitude: 0 })).toBeCloseTo(180, 9);
  // Baghdad to Osaka, the worked example that is often given for the formula: 60.16° to within its rounding.
  expect(bearingDeg({ latitude: 35, longitude: 45 }, { latitude: 35, longitude: 135 })).toBeCloseTo(60.16, 1);
});
