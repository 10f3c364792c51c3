import { describe, expect, it } from 'vitest';
import { FLAGS } from '#lib/acoustics/validity';
import { lanesOf, reasonMask, reasonsOfMask } from '../../../src/components/strip/model/lanes';
import { columnsOf } from './columns';

const lane = (lanes: ReturnType<typeof lanesOf>, key: string) => lanes.find((l) => l.key === key);

describe('the validity strip', () => {
  const columns = columnsOf([50, null, null, 52, 53, null]);
  columns.reasonBits[0] = reasonMask(['calibration']);
  columns.reasonBits[3] = reasonMask(['wind-speed']);
  columns.flagBits[4] = FLAGS.rain;
  columns.lateSec[4] = 60;
  const lanes = lanesOf([columns], { fromSec: 0, toSec: 360 }, 330);

  it('tells data and what is missing of the time that has passed', () => {
    expect(lane(lanes, 'data')?.runs).toEqual([
      { fromSec: 0, toSec: 60 },
      { fromSec: 180, toSec: 300 },
    ]);
    expect(lane(lanes, 'data')?.missing).toEqual([
      { fromSec: 60, toSec: 180 },
      { fromSec: 300, toSec: 330 },
    ]);
  });

  it('keeps reasons apart', () => {
    expect(lane(lanes, 'left-out')?.runs).toEqual([{ fromSec: 0, toSec: 60 }]);
    expect(lane(lanes, 'wind')?.runs).toEqual([{ fromSec: 180, toSec: 240 }]);
    expect(lane(lanes, 'rain')?.runs).toEqual([{ fromSec: 240, toSec: 300 }]);
    expect(lane(lanes, 'late')?.runs).toEqual([{ fromSec: 240, toSec: 300 }]);
  });

  it('joins what two layers tell on both sides of a seam, the first one counting', () => {
    const coarse = columnsOf([60, 60], { stepSec: 600 });
    const fine = columnsOf([60, null], { fromSec: 600, stepSec: 300 });
    const [data] = lanesOf([fine, coarse], { fromSec: 0, toSec: 1200 }, 5000);
    expect(data?.runs).toEqual([{ fromSec: 0, toSec: 900 }]);
    expect(data?.missing).toEqual([{ fromSec: 900, toSec: 1200 }]);
  });

  it('turns reasons into bits and back', () => {
    expect(reasonsOfMask(reasonMask(['exclusion', 'overload']))).toEqual(['overload', 'exclusion']);
  });
});
