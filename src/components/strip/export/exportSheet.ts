import { escapeHtml } from '#lib/format/escapeHtml';
import { type Palette } from '../draw/palette';
import { type Surface } from '../draw/surface';
import { drawSheet, sheetSize, type Sheet } from './drawSheet';
import { plainPalette } from './plainPalette';
import { SvgContext } from './svgContext';

/** The sheet as it is to be made: in the colours of the page, and at its device pixels in a CSS pixel. */
export interface SheetOrder {
  sheet: Sheet;
  palette: Palette;
  ratio: number;
  /** What it shows, in a sentence. */
  summary: string;
}

/** The sheet as a PNG picture. */
export function pngOfSheet({ sheet, palette, ratio }: SheetOrder): Promise<Blob> {
  const canvas = document.createElement('canvas');
  const { width, height } = sheetSize(sheet);
  canvas.width = Math.round(width * ratio);
  canvas.height = Math.round(height * ratio);
  const context = canvas.getContext('2d');
  if (!context) throw new Error('This browser cannot draw the picture.');
  drawSheet({ context, ratio, palette }, sheet);
  context.setTransform(1, 0, 0, 1, 0, 0);
  context.globalCompositeOperation = 'destination-over';
  context.fillStyle = palette.paper;
  context.fillRect(0, 0, canvas.width, canvas.height);
  return new Promise((resolve, reject) => {
    canvas.toBlob(
      (blob) => (blob ? resolve(blob) : reject(new Error('This browser cannot make the picture.'))),
      'image/png',
    );
  });
}

const HATCH = 'hatch';

/** The sheet as an SVG drawing: lines and letters stay sharp at any size; the spectrogram is a picture within. */
export function svgOfSheet(order: SheetOrder): Blob {
  const { sheet, ratio, summary } = order;
  const palette = plainPalette(order.palette);
  const measuring = document.createElement('canvas').getContext('2d');
  const context = new SvgContext((text, font) => {
    if (!measuring) return text.length * 6;
    measuring.font = font;
    return measuring.measureText(text).width;
  });
  const surface: Surface = { context, ratio, palette, hatchFill: `url(#${HATCH})` };
  drawSheet(surface, sheet);
  const { width, height } = sheetSize(sheet);
  const [across, down] = [Math.round(width * ratio), Math.round(height * ratio)];
  const text = [
    `<svg xmlns="http://www.w3.org/2000/svg" xml:space="preserve" role="img"`,
    `  width="${width}" height="${height}" viewBox="0 0 ${across} ${down}">`,
    `<title>${escapeHtml(sheet.parts.map(({ title }) => title).join(', '))}</title>`,
    `<desc>${escapeHtml(summary)}</desc>`,
    `<defs>${hatchDefinition(palette, ratio)}</defs>`,
    `<rect width="${across}" height="${down}" fill="${palette.paper}"/>`,
    context.elements(),
    '</svg>',
    '',
  ].join('\n');
  return new Blob([text], { type: 'image/svg+xml' });
}

function hatchDefinition({ hatch }: Palette, ratio: number): string {
  const size = Math.round(7 * ratio);
  const lines = [-size, 0, size].map((shift) => `M${shift - 1} ${size + 1}L${shift + size + 1} -1`).join('');
  return (
    `<pattern id="${HATCH}" width="${size}" height="${size}" patternUnits="userSpaceOnUse">` +
    `<path d="${lines}" stroke="${hatch}" stroke-width="${ratio}"/></pattern>`
  );
}
