import { beforeEach, describe, expect, it } from 'vitest';
import { stripGeometry } from '../../../src/components/strip/draw/geometry';
import { onDevice, type Surface } from '../../../src/components/strip/draw/surface';
import {
  drawSheet,
  sheetSize,
  type Sheet,
  type SheetPart,
} from '../../../src/components/strip/export/drawSheet';
import { SvgContext } from '../../../src/components/strip/export/svgContext';
import { lanesOf } from '../../../src/components/strip/model/lanes';
import { type StripLimit } from '../../../src/components/strip/model/limitLines';
import { pixelColumns } from '../../../src/components/strip/model/pixelColumns';
import { columnsOf, withPercentiles } from './columns';

const svg = () => new SvgContext((text) => text.length * 6);
const palette = new Proxy({} as Surface['palette'], { get: (_, name) => `var(${String(name)})` });

describe('a drawing as SVG', () => {
  let context: SvgContext;
  beforeEach(() => {
    context = svg();
  });

  it('scales and moves, and puts rectangles of one colour into one path', () => {
    context.setTransform(2, 0, 0, 2, 10, 0);
    context.fillStyle = 'red';
    context.fillRect(1, 2, 3, 4);
    context.fillRect(5, 2, 3, 4);
    context.fillStyle = 'blue';
    context.fillRect(0, 0, 1, 1);
    expect(context.elements()).toBe(
      '<path d="M12 4h6v8h-6zM20 4h6v8h-6z" fill="red"/>\n<path d="M10 0h2v2h-2z" fill="blue"/>',
    );
  });

  it('ends what is clipped where the canvas would', () => {
    context.save();
    context.beginPath();
    context.rect(0, 0, 4, 4);
    context.clip();
    context.fillRect(0, 0, 9, 9);
    context.restore();
    context.fillRect(1, 1, 1, 1);
    const elements = context.elements();
    expect(elements).toContain('<clipPath id="clip-1"><path d="M0 0h4v4h-4z"/></clipPath>');
    expect(elements.match(/<g /g)).toHaveLength(1);
    expect(elements.indexOf('</g>')).toBeLessThan(elements.indexOf('M1 1'));
  });

  it('writes text as text, whatever signs it holds', () => {
    context.font = "700 16px 'Noto Sans', sans-serif";
    context.textAlign = 'right';
    context.fillText('Quay <A> & "B"', 10, 20);
    expect(context.elements()).toContain('text-anchor="end"');
    expect(context.elements()).toContain('>Quay &lt;A&gt; &amp; &quot;B&quot;</text>');
  });
});

describe('the sheet', () => {
  const view = { fromSec: 1_772_323_200, toSec: 1_772_323_200 + 3600 };
  const limit: StripLimit = {
    id: 1,
    name: 'Night limit',
    metric: 'LAeq',
    averaging: '15min',
    windowMin: null,
    stepMin: null,
    thresholdDb: 55,
    weekdays: 127,
    holidays: 'as-weekday',
    holidayDates: new Set(),
    fromMin: null,
    toMin: null,
    effectiveFromSec: 0,
    effectiveToSec: null,
  };
  const columns = withPercentiles(
    columnsOf([50, null, 52, 58], { fromSec: view.fromSec, stepSec: 900 }),
    [60, 52, 48],
  );
  const geometry = stripGeometry(800);
  const part: SheetPart = {
    picture: {
      geometry,
      view,
      zone: 'Europe/London',
      nowSec: view.toSec,
      pixels: pixelColumns([columns], view, onDevice(geometry.spectrogram, 1).width),
      colouring: null,
      traceRange: { lowDb: 40, highDb: 80 },
      lanes: lanesOf([columns], view, view.toSec),
      leftOut: [],
      limits: [
        { limit, runs: [view] },
        { limit: { ...limit, name: 'Other day' }, runs: [{ fromSec: 0, toSec: 900 }] },
      ],
      complaints: [
        { reference: 'MER-2026-0007', kind: 'hum', fromSec: view.fromSec + 600, toSec: view.fromSec + 1200 },
        { reference: 'MER-2026-0008', kind: 'bang', fromSec: view.toSec, toSec: view.toSec + 600 },
      ],
      gapWords: () => 'no data',
    },
    title: 'Ropewalk School (MER-01)',
    selection: null,
    exceedances: [
      {
        id: 1,
        fromSec: view.fromSec,
        toSec: view.toSec,
        limitName: 'Night limit',
        levelDb: 58,
        thresholdDb: 55,
        unit: 'dB',
        isStanding: true,
      },
    ],
  };
  const sheet: Sheet = { parts: [part], weighting: 'Z', stepSec: 900, blockSec: 3600 };

  it('says by itself which station, period and zone it shows, what its signs mean, and the limits that hold in it', () => {
    const context = svg();
    drawSheet({ context, ratio: 1, palette, hatchFill: 'url(#hatch)' }, sheet);
    const texts = [...context.elements().matchAll(/>([^<]+)<\/text>/g)].map(([, text]) => text);
    const all = texts.join(' ');
    expect(texts).toContain('Ropewalk School (MER-01)');
    expect(all).toMatch(/Sun 1 March 2026, 00:00 to 01:00, times in Europe\/London \(GMT\)/);
    expect(all).toContain('Limit “Night limit”:');
    expect(all).toContain('above 55 dB');
    expect(all).not.toContain('Other day');
    expect(all).toContain('Complaint MER-2026-0007, hum, heard Sun 1 Mar 00:10–00:20');
    expect(all).not.toContain('MER-2026-0008');
    expect(texts).toContain('A90,1\u00a0h');
    expect(texts).toContain('Aeq,15\u00a0min');
    expect(context.elements()).toContain('url(#hatch)');
    expect(context.elements()).toContain('fill="var(rust)"');
    expect(context.elements()).toContain('fill="var(percentiles)"');
  });

  it('is as tall as what stands on it', () => {
    const one = sheetSize(sheet).height;
    expect(one).toBeGreaterThan(geometry.height + 54);
    expect(sheetSize({ ...sheet, parts: [part, part] }).height).toBeGreaterThan(one + geometry.height + 54);
  });

  it('draws what is marked and says it', () => {
    const context = svg();
    const bands = { fraction: 3, lowestIndex: -8, highestIndex: -6 } as const;
    const selection = { fromSec: view.fromSec + 900, toSec: view.fromSec + 1800, bands };
    const surface = { context, ratio: 1, palette, hatchFill: 'url(#hatch)' };
    drawSheet(surface, { ...sheet, parts: [{ ...part, selection }] });
    const elements = context.elements();
    expect(elements).toContain('stroke="var(estuary)"');
    expect(elements).toContain('>Marked: Sun 1 Mar 00:15–00:30, 160–250 Hz</text>');
  });
});
