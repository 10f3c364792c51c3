import { describe, expect, it } from 'vitest';
import { energyMeanDb } from '#lib/acoustics/energy';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { pixelColumns } from '../../../src/components/strip/model/pixelColumns';
import { columnsOf, NINE_THIRDS, withPercentiles } from './columns';

describe('columns on pixels', () => {
  it('shows a column on every pixel that it spans', () => {
    const pixels = pixelColumns([columnsOf([50, 60])], { fromSec: 0, toSec: 120 }, 6);
    expect([...pixels.laeqCentiDb]).toEqual([5000, 5000, 5000, 6000, 6000, 6000]);
    expect(pixels.levelsCentiDb[5 * NINE_THIRDS.length]).toBe(5500);
  });

  it('shows the energy mean and the range of the columns that one pixel spans', () => {
    const pixels = pixelColumns([columnsOf([50, 60, 40, 40])], { fromSec: 0, toSec: 240 }, 2);
    expect(pixels.laeqCentiDb[0]).toBe(Math.round((energyMeanDb([50, 60]) ?? 0) * 100));
    expect([pixels.laeqLowCentiDb[0], pixels.laeqHighCentiDb[0]]).toEqual([5000, 6000]);
    expect(pixels.lafmaxCentiDb[0]).toBe(7000);
    expect(pixels.levelsCentiDb[0]).toBe(Math.round((energyMeanDb([45, 55]) ?? 0) * 100));
  });

  it('leaves a gap without a level, never quiet, and knows it apart from what was not fetched', () => {
    const pixels = pixelColumns([columnsOf([50, null, 60])], { fromSec: 0, toSec: 240 }, 4);
    expect(pixels.laeqCentiDb[1]).toBe(NO_LEVEL_CENTI_DB);
    expect(pixels.levelsCentiDb[NINE_THIRDS.length]).toBe(NO_LEVEL_CENTI_DB);
    expect([...pixels.isKnown]).toEqual([1, 1, 1, 0]);
  });

  it('prefers the first layer where layers overlap and keeps the other elsewhere', () => {
    const coarse = columnsOf([70, 70], { stepSec: 600 });
    const fine = columnsOf([50, 51], { fromSec: 600, stepSec: 60 });
    const pixels = pixelColumns([fine, coarse], { fromSec: 0, toSec: 1200 }, 20);
    expect(pixels.laeqCentiDb[9]).toBe(7000);
    expect([...pixels.laeqCentiDb.slice(10, 13)]).toEqual([5000, 5100, 7000]);
  });

  it('counts every column once when many fall on a pixel', () => {
    const levels = Array.from({ length: 1440 }, (_, i) => (i === 700 ? 90 : 40));
    const pixels = pixelColumns([columnsOf(levels)], { fromSec: 0, toSec: 86_400 }, 777);
    expect([...pixels.laeqHighCentiDb].filter((high) => high === 9000)).toHaveLength(1);
  });
});

it('shows exceedance levels of the block in the middle of a pixel, and none where there are no data', () => {
  const columns = withPercentiles(columnsOf([50, 51, null, 53]), [56, 52, 47]);
  columns.percentiles?.la10CentiDb.set([5600, 5700, 5800, 5900]);
  const pixels = pixelColumns([columns], { fromSec: 0, toSec: 240 }, 2);
  expect([...pixels.la10CentiDb]).toEqual([5700, 5900]);
  const each = pixelColumns([columns], { fromSec: 0, toSec: 240 }, 4);
  expect([...each.la10CentiDb]).toEqual([5600, 5700, NO_LEVEL_CENTI_DB, 5900]);
  expect([...pixelColumns([columnsOf([50])], { fromSec: 0, toSec: 60 }, 1).la90CentiDb]).toEqual([
    NO_LEVEL_CENTI_DB,
  ]);
});
