import { describe, expect, it } from 'vitest';
import type { Station } from '#lib/contracts/stations';
import { markStateOf, stationSentence } from '../../../src/components/map/model/stationWords';

const nowSec = Date.parse('2026-03-17T12:01:40Z') / 1000;
const station: Station = {
  code: 'MER-01',
  name: 'Quay Head',
  latitude: 54.1,
  longitude: 1.6,
  bandFraction: 3,
  intervalSeconds: 60,
  firstBandHz: 20,
  lastBandHz: 20000,
  placement: 'free-field',
  facadeCorrection: 3,
  expectedFlags: [],
  mastHeight: 4,
  surroundings: '',
  acceptsFrom: null,
  createdAt: '2026-01-01T00:00:00Z',
  retiredAt: null,
  state: 'live',
  overLimit: false,
  latest: {
    start: '2026-03-17T12:00:00Z',
    seconds: 60,
    LAeq: 64.25,
    LAFmax: null,
    flags: [],
    windSpeed: null,
    battery: null,
    receivedAt: '2026-03-17T12:01:05Z',
  },
};

describe('a station on the map in words', () => {
  it('gives the level with its averaging time and age', () => {
    expect(stationSentence(station, 'Europe/London', nowSec)).toBe(
      'Quay Head, MER-01: LAeq,1 min 64.3 dB, 40 s ago.',
    );
  });

  it('says that it is over a limit', () => {
    expect(stationSentence({ ...station, overLimit: true }, 'Europe/London', nowSec)).toMatch(/over a limit/);
    expect(markStateOf({ ...station, overLimit: true })).toBe('over-limit');
  });

  it('gives no level of a silent station, whatever its last one was', () => {
    const silent: Station = { ...station, state: 'silent', overLimit: true };
    expect(stationSentence(silent, 'Europe/London', nowSec)).toBe('Quay Head, MER-01: silent since 12:01.');
    expect(markStateOf(silent)).toBe('silent');
  });
});
