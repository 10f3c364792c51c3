import { expect, test } from 'vitest';
import { bandRange } from '#lib/acoustics/bands';
import { levelFromBandsDb } from '#lib/acoustics/weighting';
import { SOUNDSCAPES } from '#ingest/monitor/soundscape/places';
import { makeRecorder } from '#ingest/monitor/soundscape/record';

const THIRDS = { bandFraction: 3, intervalSec: 60, firstBandHz: 20, lastBandHz: 20_000 } as const;
const at = (text: string) => Date.parse(text) / 1000;
const soundscape = (code: string) => {
  const found = SOUNDSCAPES.find((candidate) => candidate.code === code);
  if (!found) throw new Error(code);
  return found;
};

test('the same interval is the same whenever it is made', () => {
  const [once, again] = [
    makeRecorder(soundscape('MER-01'), THIRDS),
    makeRecorder(soundscape('MER-01'), THIRDS),
  ];
  again(at('2026-11-24T11:00:00Z'));
  expect(again(at('2026-11-24T02:10:00Z'))).toEqual(once(at('2026-11-24T02:10:00Z')));
});

test('the A level is that of the bands, and lies between the extremes', () => {
  const record = makeRecorder(soundscape('MER-04'), THIRDS);
  for (let minute = 0; minute < 600; minute += 7) {
    const { LAeq, LAFmax, LAFmin, levels } = record(at('2026-11-24T02:00:00Z') + minute * 60);
    const fromBandsDb = levelFromBandsDb(levels, bandRange(3, 20, 20_000), 'A');
    expect(Math.abs(LAeq - (fromBandsDb ?? 0))).toBeLessThan(0.15);
    expect(LAFmin).toBeLessThanOrEqual(LAeq);
    expect(LAFmax).toBeGreaterThanOrEqual(LAeq);
  }
});

test('the silo fan stands out in the 100 Hz third on weekday nights and not on Saturday night', () => {
  const record = makeRecorder(soundscape('MER-02'), THIRDS);
  const excessDb = (time: string) => {
    const { levels } = record(at(time));
    return (levels[7] ?? 0) - Math.max(levels[6] ?? 0, levels[8] ?? 0);
  };
  expect(bandRange(3, 20, 20_000)[7]?.nominalHz).toBe(100);
  expect(excessDb('2026-11-25T02:00:00Z')).toBeGreaterThan(12);
  expect(excessDb('2026-11-29T02:00:00Z')).toBeLessThan(10);
});
