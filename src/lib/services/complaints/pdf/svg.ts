import { escapeHtml } from '#lib/format/escapeHtml';
import { FONT } from '../../summaries/pdf/printer';
import { SOFT_INK } from '../../summaries/pdf/typography';

/** A number of a drawing, to hundredths. */
export function n(value: number): string {
  return String(Math.round(value * 100) / 100);
}

export function line(x1: number, y1: number, x2: number, y2: number, colour: string, width: number): string {
  return `<line x1="${n(x1)}" y1="${n(y1)}" x2="${n(x2)}" y2="${n(y2)}" stroke="${colour}" stroke-width="${width}"/>`;
}

export function label(
  x: number,
  y: number,
  text: string,
  anchor: 'start' | 'middle' | 'end',
  colour: string = SOFT_INK,
): string {
  return (
    `<text x="${n(x)}" y="${n(y)}" font-family="${FONT}" font-size="7.5" fill="${colour}" text-anchor="${anchor}">` +
    `${escapeHtml(text)}</text>`
  );
}

export function svg(width: number, height: number, parts: readonly string[]): string {
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="0 0 ${width} ${height}">` +
    `${parts.join('')}</svg>`
  );
}
