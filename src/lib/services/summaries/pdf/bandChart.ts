import { bandByNominalHz, bandLabel } from '#lib/acoustics/bands';
import type { SummaryBand } from '#lib/contracts/summaries';
import { FONT } from './printer';
import { INK, RULE, SOFT_INK } from './typography';

const WIDTH = 481;
const HEIGHT = 170;
const LEFT = 34;
const BOTTOM = 34;
const TOP = 20;
const STEP_DB = 10;

/** Band levels of a month as an SVG drawing: a bar for Leq, a tick for L10 and L90; null where no band has a level. */
export function bandChartSvg(bands: readonly SummaryBand[]): string | null {
  const levels = bands.flatMap(({ Leq, L10, L90 }) => [Leq, L10, L90]).filter((level) => level !== null);
  if (levels.length === 0) return null;
  const lowDb = Math.floor((Math.min(...levels) - 1) / STEP_DB) * STEP_DB;
  const highDb = Math.ceil((Math.max(...levels) + 1) / STEP_DB) * STEP_DB;
  const y = (db: number) => HEIGHT - BOTTOM - ((db - lowDb) / (highDb - lowDb)) * (HEIGHT - BOTTOM - TOP);
  const slot = (WIDTH - LEFT) / bands.length;
  const grid: string[] = [];
  for (let db = lowDb; db <= highDb; db += STEP_DB) {
    grid.push(line(LEFT, y(db), WIDTH, y(db), RULE, 0.4), label(LEFT - 6, y(db) + 2.5, String(db), 'end'));
  }
  const marks = bands.map((band, at) => bandMarks(band, LEFT + at * slot, slot, y, y(lowDb)));
  const labels = bands.map((band, at) => bandText(band, LEFT + (at + 0.5) * slot, bands.length));
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" width="${WIDTH}" height="${HEIGHT}" viewBox="0 0 ${WIDTH} ${HEIGHT}">` +
    `${grid.join('')}${marks.join('')}${labels.join('')}${label(LEFT - 6, 9, 'dB', 'end')}` +
    `${label(WIDTH, HEIGHT - 2, 'Nominal mid-band frequency, Hz', 'end')}</svg>`
  );
}

function bandMarks(
  { Leq, L10, L90 }: SummaryBand,
  x: number,
  slot: number,
  y: (db: number) => number,
  foot: number,
): string {
  const bar =
    Leq === null
      ? ''
      : `<rect x="${n(x + slot * 0.18)}" y="${n(y(Leq))}" width="${n(slot * 0.64)}" height="${n(foot - y(Leq))}" fill="#8fa593"/>`;
  const ten = L10 === null ? '' : line(x + slot * 0.1, y(L10), x + slot * 0.9, y(L10), INK, 1.1);
  const ninety =
    L90 === null
      ? ''
      : line(x + slot * 0.28, y(L90), x + slot * 0.72, y(L90), '#ffffff', 2.2) +
        line(x + slot * 0.28, y(L90), x + slot * 0.72, y(L90), INK, 0.9);
  return bar + ten + ninety;
}

function bandText(band: SummaryBand, x: number, count: number): string {
  const index = bandByNominalHz(3, band.nominalHz)?.index ?? 0;
  if (count > 12 && index % 3 !== 0) return '';
  return label(x, HEIGHT - BOTTOM + 12, bandLabel(band).replace(' Hz', '').replace(' kHz', 'k'), 'middle');
}

function line(x1: number, y1: number, x2: number, y2: number, colour: string, width: number): string {
  return `<line x1="${n(x1)}" y1="${n(y1)}" x2="${n(x2)}" y2="${n(y2)}" stroke="${colour}" stroke-width="${width}"/>`;
}

function label(x: number, y: number, text: string, anchor: 'middle' | 'end'): string {
  return `<text x="${n(x)}" y="${n(y)}" font-family="${FONT}" font-size="7.5" fill="${SOFT_INK}" text-anchor="${anchor}">${text}</text>`;
}

function n(value: number): string {
  return value.toFixed(2);
}
