import { describe, expect, it } from 'vitest';
import { bandsOf } from '#lib/acoustics/bands';
import { bandAtPx, bandTicks } from '../../../src/components/strip/model/bandAxis';
import { exceedanceMarks, type StripExceedance } from '../../../src/components/strip/model/exceedanceMarks';
import {
  colourRange,
  levelTicks,
  pxOfLevel,
  traceRange,
} from '../../../src/components/strip/model/levelAxis';
import { octaveColumns } from '../../../src/components/strip/model/octaveColumns';
import { columnsOf, NINE_THIRDS } from './columns';

describe('the frequency axis', () => {
  const thirds = bandsOf(3).slice(2);

  it('runs upward', () => {
    expect(thirds[bandAtPx(thirds, 310, 1)]?.nominalHz).toBe(20000);
    expect(thirds[bandAtPx(thirds, 310, 309)]?.nominalHz).toBe(20);
  });

  it('names octave mid-bands by nominal frequency, fewer where there is little room', () => {
    expect(bandTicks(thirds, 310, 14).map((t) => t.label)).toEqual([
      '31.5',
      '63',
      '125',
      '250',
      '500',
      '1k',
      '2k',
      '4k',
      '8k',
      '16k',
    ]);
    expect(bandTicks(thirds, 120, 20).map((t) => t.label)).toEqual(['63', '250', '1k', '4k', '16k']);
    expect(bandTicks(bandsOf(1), 330, 14)).toHaveLength(11);
  });
});

describe('the level axis', () => {
  it('spans the data and the limits in tens', () => {
    const range = traceRange([Int16Array.of(4810, -32768, 7130)], [82]);
    expect(range).toEqual({ lowDb: 40, highDb: 90 });
    expect(levelTicks(range, 150, 20)).toEqual([40, 50, 60, 70, 80]);
    expect(pxOfLevel(range, 100, 90)).toBe(0);
  });

  it('has a range even without data', () => {
    expect(traceRange([Int16Array.of(-32768)], [])).toEqual({ lowDb: 30, highDb: 90 });
  });
});

describe('the range of colours', () => {
  it('ignores the odd extreme and missing levels', () => {
    const levels = new Int16Array(5000).fill(5210);
    levels[0] = 12000;
    levels[1] = -32768;
    levels.fill(3110, 100, 200);
    expect(colourRange(levels, [0])).toEqual({ lowDb: 30, highDb: 60 });
    expect(colourRange(new Int16Array(4).fill(-32768), [0])).toBeNull();
  });
});

describe('octaves of the columns', () => {
  it('are energy sums of three thirds and none where one is missing', () => {
    const columns = columnsOf([55, 55]);
    columns.levelsCentiDb[NINE_THIRDS.length + 1] = -32768;
    const octaves = octaveColumns(columns);
    // Of 80 Hz–630 Hz only the octaves 125 Hz and 250 Hz have all three thirds.
    expect(octaves.bands.map((band) => band.nominalHz)).toEqual([125, 250]);
    expect([...octaves.levelsCentiDb]).toEqual([5477, 5477, -32768, 5477]);
  });
});

describe('marks of exceedances', () => {
  const at = (id: number, fromSec: number, isStanding = true): StripExceedance => ({
    id,
    fromSec,
    toSec: fromSec,
    limitName: 'Day',
    unit: 'dB',
    levelDb: 70,
    thresholdDb: 68,
    isStanding,
  });

  it('gather where they would lie on one another, and leave out lifted ones and those out of sight', () => {
    const marks = exceedanceMarks(
      [at(1, 10), at(2, 14), at(3, 50), at(4, 52, false), at(5, 900)],
      (s) => s,
      100,
      12,
    );
    expect(marks.map((m) => m.held.map((e) => e.id))).toEqual([[1, 2], [3]]);
  });
});
