import { describe, expect, it } from 'vitest';
import { FLAGS } from '#lib/acoustics/validity';
import { lanesOf, leftOutRuns, reasonMask, reasonsOfMask } from '../../../src/components/strip/model/lanes';
import { columnsOf } from './columns';

const lane = (lanes: ReturnType<typeof lanesOf>, key: string) =>
  lanes.find((l) => l.key === key)?.runs.map((run) => [run.kind, run.fromSec, run.toSec]);

describe('the validity strip', () => {
  const columns = columnsOf([50, null, null, 52, 53, null]);
  columns.reasonBits[0] = reasonMask(['calibration']);
  columns.reasonBits[3] = reasonMask(['wind-speed']);
  columns.flagBits[4] = FLAGS.rain;
  columns.lateSec[4] = 60;
  const lanes = lanesOf([columns], { fromSec: 0, toSec: 360 }, 330);

  it('tells data and what is missing of the time that has passed', () => {
    expect(lane(lanes, 'data')).toEqual([
      ['data', 0, 60],
      ['data', 180, 300],
      ['missing', 60, 180],
      ['missing', 300, 330],
    ]);
  });

  it('keeps reasons apart, and what is only noted apart from what is left out', () => {
    expect(lane(lanes, 'left-out')).toEqual([['left-out', 0, 60]]);
    expect(lane(lanes, 'wind')).toEqual([['left-out', 180, 240]]);
    expect(lane(lanes, 'rain')).toEqual([['noted', 240, 300]]);
    expect(lane(lanes, 'late')).toEqual([['noted', 240, 300]]);
    expect(leftOutRuns([columns], { fromSec: 0, toSec: 360 })).toEqual([
      { fromSec: 0, toSec: 60 },
      { fromSec: 180, toSec: 240 },
    ]);
  });

  it('shows rain as left out where the network leaves it out', () => {
    const wet = columnsOf([50]);
    wet.flagBits[0] = FLAGS.rain;
    wet.reasonBits[0] = reasonMask(['rain']);
    expect(lane(lanesOf([wet], { fromSec: 0, toSec: 60 }, 60), 'rain')).toEqual([['left-out', 0, 60]]);
  });

  it('joins what two layers tell on both sides of a seam, the first one counting', () => {
    const coarse = columnsOf([60, 60], { stepSec: 600 });
    const fine = columnsOf([60, null], { fromSec: 600, stepSec: 300 });
    expect(lane(lanesOf([fine, coarse], { fromSec: 0, toSec: 1200 }, 5000), 'data')).toEqual([
      ['data', 0, 900],
      ['missing', 900, 1200],
    ]);
  });

  it('turns reasons into bits and back', () => {
    expect(reasonsOfMask(reasonMask(['exclusion', 'overload']))).toEqual(['overload', 'exclusion']);
  });
});
