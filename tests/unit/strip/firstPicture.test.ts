import { describe, expect, test } from 'vitest';
import { firstColumnsUrls, firstPictures, type FirstStrips } from '#components/strip/early/firstPicture.ts';
import { stripGeometry } from '#components/strip/draw/geometry.ts';
import { columnsOf } from './columns';

const DAY_SEC = 86_400;
const FROM_SEC = 1_700_006_400;

const strips = (tracks: FirstStrips['tracks']): FirstStrips => ({
  slug: 'merrow',
  zone: 'Europe/London',
  period: { fromSec: FROM_SEC, toSec: FROM_SEC + DAY_SEC },
  clocks: [],
  madeSec: FROM_SEC + 3 * DAY_SEC,
  tracks,
});
const track = (code: string, shiftSec = 0): FirstStrips['tracks'][number] => ({
  station: { code, bandFraction: 3, intervalSec: 60 },
  shiftSec,
  limits: [],
  complaints: [],
});
const place = { widthPx: 900, ratio: 2, theme: 'dark' } as const;

describe('the first picture', () => {
  test('asks for each strip’s own time, and only for what is in view', () => {
    const [own, earlier] = firstColumnsUrls(strips([track('MER-01'), track('MER-02', -DAY_SEC)]));
    expect(own?.length).toBeGreaterThan(0);
    expect(own?.every((url) => url.startsWith('/api/v1/networks/merrow/stations/MER-01/spectrogram?'))).toBe(
      true,
    );
    const froms = [own, earlier].map((urls) =>
      Math.min(
        ...(urls ?? []).map((url) => Date.parse(new URL(url, 'http://x').searchParams.get('from') ?? '')),
      ),
    );
    expect((froms[1] ?? 0) / 1000).toBeLessThanOrEqual(FROM_SEC - DAY_SEC);
    expect((froms[0] ?? 0) / 1000).toBeGreaterThan(FROM_SEC - DAY_SEC);
  });

  test('has the strip’s own size, and one range of colours for two strips', () => {
    const quiet = columnsOf([30, 35], { fromSec: FROM_SEC, stepSec: 900 });
    const loud = columnsOf([80, 90], { fromSec: FROM_SEC, stepSec: 900 });
    const [a, b] = firstPictures(strips([track('MER-01'), track('MER-02')]), [[quiet], [loud]], place);
    expect(a?.geometry).toEqual(stripGeometry(900));
    expect(a?.pixels.widthPx).toBe(stripGeometry(900).spectrogram.width * 2);
    expect(a?.colouring?.range).toEqual(b?.colouring?.range);
    expect(a?.traceRange).toEqual(b?.traceRange);
    const [alone] = firstPictures(strips([track('MER-01')]), [[quiet]], place);
    expect(alone?.colouring?.range.highDb).toBeLessThan(a?.colouring?.range.highDb ?? 0);
  });

  test('is left to the strip where there is nothing to draw', () => {
    expect(firstPictures(strips([track('MER-01')]), [[]], place)).toEqual([null]);
    const silent = columnsOf([null, null], { fromSec: FROM_SEC, stepSec: 900 });
    expect(firstPictures(strips([track('MER-01')]), [[silent]], place)).toEqual([null]);
  });
});
