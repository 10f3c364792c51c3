import { describe, expect, it } from 'vitest';
import { energyMeanDb } from '#lib/acoustics/energy';
import { estimateFigures } from '../../../src/components/strip/model/estimate';
import { columnsOf } from './columns';

const LATER = 1e9;

describe('figures of a selection from the screen', () => {
  it('are the energy mean of the intervals inside, clipped by duration at the edges', () => {
    const figures = estimateFigures([columnsOf([50, 60, 70])], { fromSec: 30, toSec: 120 }, 60, LATER);
    expect(figures?.laeqDb).toBeCloseTo(energyMeanDb([50, 60], [30, 60]) ?? 0, 9);
    expect(figures).toMatchObject({ expectedSec: 90, validSec: 90, lafmaxDb: 70 });
    expect(figures?.bandLeqDb[0]).toBeCloseTo(energyMeanDb([45, 55], [30, 60]) ?? 0, 9);
  });

  it('leave out gaps and what does not count, and say what is covered', () => {
    const columns = columnsOf([50, null, 90, 50]);
    columns.validSec[2] = 0;
    const figures = estimateFigures([columns], { fromSec: 0, toSec: 240 }, 60, LATER);
    expect(figures?.laeqDb).toBeCloseTo(50, 9);
    expect(figures).toMatchObject({ expectedSec: 240, validSec: 120 });
  });

  it('are null, not zero, where nothing counts', () => {
    const figures = estimateFigures([columnsOf([null, null])], { fromSec: 0, toSec: 120 }, 60, LATER);
    expect(figures).toMatchObject({ laeqDb: null, lafmaxDb: null, validSec: 0 });
  });

  it('have exceedance levels only from base samples', () => {
    const levels = Array.from({ length: 60 }, (_, i) => 40 + i * 0.1);
    const run = { fromSec: 0, toSec: 3600 };
    expect(estimateFigures([columnsOf(levels)], run, 60, LATER)?.la90Db).toBe(40.5);
    expect(estimateFigures([columnsOf(levels)], run, 10, LATER)?.la90Db).toBeNull();
  });

  it('go on over the seam of two tiles', () => {
    const layers = [columnsOf([50, 50]), columnsOf([60, 60], { fromSec: 120 })];
    const figures = estimateFigures(layers, { fromSec: 60, toSec: 180 }, 60, LATER);
    expect(figures?.laeqDb).toBeCloseTo(energyMeanDb([50, 60]) ?? 0, 9);
    expect(figures).toMatchObject({ expectedSec: 120, validSec: 120 });
  });

  it('are not given where the screen does not hold the whole stretch', () => {
    expect(estimateFigures([columnsOf([50])], { fromSec: 0, toSec: 120 }, 60, LATER)).toBeNull();
  });
});
