import { bandByNominalHz, bandLabel } from '#lib/acoustics/bands';
import { type DocumentStation, type MonthDocument } from '#lib/contracts/monthDocument';
import { type SummaryMetric } from '#lib/contracts/summaryTemplate';
import { levelColour } from '#lib/format/levelRamp';
import { skippedHours } from '../../../figures/civilHours';
import { type DocumentFormat } from '../format';
import { type MonthWords } from '../words/words';
import { BLUE, GREEN, INK, PALE, RULE, RUST, SMALL, SOFT_INK } from './fonts';
import { LEFT, WIDTH, type Pages } from './pages';

/** What charts are drawn with. */
export interface ChartGround {
  pages: Pages;
  words: MonthWords;
  format: DocumentFormat;
}

const AXIS = 30;

const TRENDS = [
  { name: 'Lden', kind: 'whole', colour: RUST },
  { name: 'Lday', kind: 'day', colour: GREEN },
  { name: 'Lnight', kind: 'night', colour: BLUE },
] as const;

/** Draws a figure of some height with its alternative text, kept on one page. */
export function figure(pages: Pages, height: number, alt: string, draw: (top: number) => void): void {
  pages.ensure(height + 4);
  const top = pages.y;
  const bbox = [LEFT, top, LEFT + WIDTH, top + height] as [number, number, number, number];
  pages.add('Figure', () => draw(top), { alt, bbox } as PDFKit.Mixins.StructureElementOptions);
  pages.y = top + height + 4;
}

/** Steps of a scale of levels that spans some values, dB. */
function levelScale(levels: readonly number[], stepDb: number): { lowDb: number; highDb: number } {
  const lowDb = Math.floor((Math.min(...levels) - 0.5) / stepDb) * stepDb;
  const highDb = Math.ceil((Math.max(...levels) + 0.5) / stepDb) * stepDb;
  return { lowDb, highDb: Math.max(highDb, lowDb + stepDb) };
}

/** Lden, Lday and Lnight of each date, those of them that are among the chosen figures. */
export function trendChart(
  { pages, words }: ChartGround,
  station: DocumentStation,
  metrics: readonly SummaryMetric[],
): void {
  const series = TRENDS.filter(({ name }) => metrics.includes(name)).map(({ name, kind, colour }) => ({
    name,
    colour,
    of: station.days.map((day) => ({ db: day[name], isWhole: day.periods[kind].meetsMinimum })),
  }));
  const levels = series.flatMap(({ of }) => of.flatMap(({ db }) => (db === null ? [] : [db])));
  if (levels.length === 0) return;
  const height = 120;
  const { doc } = pages;
  const range = levelScale(levels, 5);
  figure(pages, height, words.alternatives.trend(station.code), (top) => {
    const plot = { left: LEFT + AXIS, right: LEFT + WIDTH - 44, top: top + 8, bottom: top + height - 20 };
    const y = gridLines(pages, plot, range, 5);
    const step = (plot.right - plot.left) / Math.max(1, station.days.length);
    const x = (at: number) => plot.left + (at + 0.5) * step;
    station.days.forEach(({ date }, at) => {
      const day = Number(date.slice(8));
      if (day % 5 === 0 || day === 1)
        pages.put(String(day), x(at) - 3, plot.bottom + 3, { size: SMALL, colour: SOFT_INK });
    });
    const ends: number[] = [];
    for (const { name, colour, of } of series) {
      of.forEach(({ db }, at) => {
        const next = of[at + 1]?.db ?? null;
        if (db === null || next === null) return;
        doc
          .moveTo(x(at), y(db))
          .lineTo(x(at + 1), y(next))
          .lineWidth(0.9)
          .strokeColor(colour)
          .stroke();
      });
      of.forEach(({ db, isWhole }, at) => {
        if (db === null) return;
        // An open dot: coverage below the minimum.
        doc.circle(x(at), y(db), 1.7).lineWidth(0.8);
        if (isWhole) doc.fillColor(colour).fill();
        else doc.fillAndStroke('#ffffff', colour);
      });
      const last = of.findLast(({ db }) => db !== null)?.db ?? null;
      if (last === null) continue;
      let labelY = y(last) - 5;
      while (ends.some((end) => Math.abs(end - labelY) < 9)) labelY += 3;
      ends.push(labelY);
      pages.put(name, plot.right + 4, labelY, { size: SMALL + 0.5, colour });
    }
    pages.put(words.axes.date, plot.left, plot.bottom + 11, { size: SMALL, colour: SOFT_INK });
    pages.put('dB', LEFT, plot.top - 8, { size: SMALL, colour: SOFT_INK });
  });
}

/** Hourly LAeq by date and hour of the clock on the wall. */
export function heatMap(
  { pages, words, format }: ChartGround,
  doc: MonthDocument,
  station: DocumentStation,
): void {
  const levels = station.hours.flatMap(({ LAeq }) => (LAeq === null ? [] : [LAeq]));
  if (levels.length === 0) return;
  const range = levelScale(levels, 5);
  const dates = [...new Set(station.hours.map(({ date }) => date))];
  const rowHeight = Math.min(9, 280 / dates.length);
  const height = dates.length * rowHeight + 34;
  const { doc: pdf } = pages;
  const alt = words.alternatives.heatMap(station.code, format.level(range.lowDb), format.level(range.highDb));
  figure(pages, height, alt, (top) => {
    const left = LEFT + AXIS;
    const width = (WIDTH - AXIS - 74) / 24;
    const twice = new Set(
      station.hours.flatMap(({ turn, date, hour }) => (turn === 1 ? [`${date} ${hour}`] : [])),
    );
    const rowOf = new Map(dates.map((date, at) => [date, top + 12 + at * rowHeight]));
    for (const { date, hour, turn, LAeq, meetsMinimum } of station.hours) {
      const y = rowOf.get(date) ?? top;
      const cellWidth = twice.has(`${date} ${hour}`) ? width / 2 : width;
      const x = left + hour * width + turn * cellWidth;
      if (LAeq === null) continue;
      pdf
        .rect(x + 0.2, y + 0.2, cellWidth - 0.4, rowHeight - 0.4)
        .fillColor(hexOf(LAeq, range))
        .fill();
      if (!meetsMinimum) hatch(pages, x, y, cellWidth, rowHeight);
    }
    for (const date of dates) {
      const y = rowOf.get(date) ?? top;
      for (const hour of skippedHours(date, doc.timeZone)) {
        pdf
          .moveTo(left + hour * width + 3, y + rowHeight / 2)
          .lineTo(left + (hour + 1) * width - 3, y + rowHeight / 2);
        pdf.lineWidth(0.6).strokeColor(SOFT_INK).stroke();
      }
      pages.put(date.slice(8), LEFT + 12, y + rowHeight / 2 - 5, { size: 6.5, colour: SOFT_INK });
    }
    for (let hour = 0; hour < 24; hour += 3) {
      pages.put(String(hour).padStart(2, '0'), left + hour * width, top, { size: SMALL, colour: SOFT_INK });
    }
    pages.put(words.axes.hour, left, top + 14 + dates.length * rowHeight, { size: SMALL, colour: SOFT_INK });
    rampLegend(pages, range, format, {
      x: LEFT + WIDTH - 52,
      top: top + 12,
      height: Math.min(160, dates.length * rowHeight),
    });
  });
}

/** Levels of the bands: a bar for Leq, ticks for L10 and L90. */
export function bandChart({ pages, words, format }: ChartGround, station: DocumentStation): void {
  const { bands, figures } = station;
  const levels = bands.flatMap(({ Leq, L10, L90 }) => [Leq, L10, L90]).filter((db) => db !== null);
  if (levels.length === 0) return;
  const { doc } = pages;
  const height = 150;
  const range = levelScale(levels, 10);
  pages.paragraph(
    words.captions.bands(format.coverage(figures.coverage)),
    { size: SMALL + 0.5, colour: SOFT_INK },
    2,
  );
  figure(pages, height, words.alternatives.bands(station.code), (top) => {
    const plot = { left: LEFT + AXIS, right: LEFT + WIDTH, top: top + 8, bottom: top + height - 26 };
    const y = gridLines(pages, plot, range, 10);
    const slot = (plot.right - plot.left) / bands.length;
    bands.forEach((band, at) => {
      const x = plot.left + at * slot;
      const { Leq, L10, L90 } = band;
      if (Leq !== null)
        doc
          .rect(x + slot * 0.18, y(Leq), slot * 0.64, plot.bottom - y(Leq))
          .fillColor(PALE)
          .fill();
      if (L10 !== null) line(pages, x + slot * 0.08, y(L10), x + slot * 0.92, y(L10), INK, 1.1);
      if (L90 !== null) {
        line(pages, x + slot * 0.26, y(L90), x + slot * 0.74, y(L90), '#ffffff', 2.4);
        line(pages, x + slot * 0.26, y(L90), x + slot * 0.74, y(L90), INK, 1);
      }
      const index = bandByNominalHz(3, band.nominalHz)?.index ?? 0;
      if (bands.length > 12 && index % 3 !== 0) return;
      const name = bandLabel(band).replace(' Hz', '').replace(' kHz', 'k');
      pages.put(name, x + slot / 2 - pages.measure(name, 'regular', SMALL) / 2, plot.bottom + 3, {
        size: SMALL,
        colour: SOFT_INK,
      });
    });
    pages.put(words.axes.frequency, plot.right, plot.bottom + 13, {
      size: SMALL,
      colour: SOFT_INK,
      align: 'right',
    });
    pages.put('dB', LEFT, plot.top - 8, { size: SMALL, colour: SOFT_INK });
  });
}

/** A bar of the ramp with its levels, so that a colour can be read. */
export function rampLegend(
  pages: Pages,
  range: { lowDb: number; highDb: number },
  format: DocumentFormat,
  { x, top, height }: { x: number; top: number; height: number },
): void {
  const steps = 40;
  for (let step = 0; step < steps; step += 1) {
    const db = range.highDb - ((step + 0.5) / steps) * (range.highDb - range.lowDb);
    pages.doc
      .rect(x, top + (step * height) / steps, 10, height / steps + 0.3)
      .fillColor(hexOf(db, range))
      .fill();
  }
  pages.put(`${format.number(range.highDb, 0)} dB`, x + 14, top - 3, { size: SMALL, colour: SOFT_INK });
  pages.put(format.number((range.highDb + range.lowDb) / 2, 0), x + 14, top + height / 2 - 5, {
    size: SMALL,
    colour: SOFT_INK,
  });
  pages.put(format.number(range.lowDb, 0), x + 14, top + height - 8, { size: SMALL, colour: SOFT_INK });
}

type Plot = { left: number; right: number; top: number; bottom: number };

function gridLines(
  pages: Pages,
  plot: Plot,
  { lowDb, highDb }: { lowDb: number; highDb: number },
  stepDb: number,
): (db: number) => number {
  const y = (db: number) => plot.bottom - ((db - lowDb) / (highDb - lowDb)) * (plot.bottom - plot.top);
  for (let db = lowDb; db <= highDb; db += stepDb) {
    line(pages, plot.left, y(db), plot.right, y(db), RULE, 0.4);
    pages.put(String(db), plot.left - 4, y(db) - 5, { size: SMALL, colour: SOFT_INK, align: 'right' });
  }
  return y;
}

function line(
  { doc }: Pages,
  x1: number,
  y1: number,
  x2: number,
  y2: number,
  colour: string,
  width: number,
): void {
  doc.moveTo(x1, y1).lineTo(x2, y2).lineWidth(width).strokeColor(colour).stroke();
}

/** Lines over a cell whose coverage is below the minimum. */
function hatch({ doc }: Pages, x: number, y: number, width: number, height: number): void {
  doc.save().rect(x, y, width, height).clip();
  for (let at = -height; at < width; at += 3) doc.moveTo(x + at, y + height).lineTo(x + at + height, y);
  doc.lineWidth(0.5).strokeColor('#ffffff').stroke().restore();
}

function hexOf(db: number, range: { lowDb: number; highDb: number }): string {
  const parts = levelColour(db, range, 'light').match(/\d+/g) ?? [];
  return `#${parts.map((part) => Number(part).toString(16).padStart(2, '0')).join('')}`;
}
