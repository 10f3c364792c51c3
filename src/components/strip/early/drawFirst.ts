import { drawStrip } from '../draw/drawStrip';
import { readPalette } from '../draw/palette';
import { EARLY_DATA_ID } from './earlyScript';
import { themeNow } from '../model/theme';
import { earlyColumns } from './earlyColumns';
import { firstColumnsUrls, firstPictures, type FirstStrips } from './firstPicture';

/** Draws the strips as soon as their columns are there, where the strip's own scripts have not yet. */
async function drawFirst(strips: FirstStrips): Promise<void> {
  const asked = firstColumnsUrls(strips).map((urls) => Promise.all(urls.map(earlyColumns)));
  const fetched = (await Promise.all(asked)).map((columns) => columns.flatMap((one) => one ?? []));
  const canvases = [...document.querySelectorAll<HTMLCanvasElement>('canvas[data-first-picture]')];
  const widthPx = Math.floor(canvases[0]?.getBoundingClientRect().width ?? 0);
  if (widthPx === 0) return;
  const ratio = window.devicePixelRatio;
  const pictures = firstPictures(strips, fetched, { widthPx, ratio, theme: themeNow() });
  const palette = readPalette(document.body);
  canvases.forEach((canvas, at) => {
    const picture = pictures[at];
    canvas.width = Math.round(widthPx * ratio);
    canvas.height = Math.round((picture?.geometry.height ?? 0) * ratio);
    const context = canvas.getContext('2d');
    if (picture && context) drawStrip({ context, ratio, palette }, picture);
  });
}

const said = document.getElementById(EARLY_DATA_ID)?.textContent;
if (said) void drawFirst((JSON.parse(said) as { strips: FirstStrips }).strips);
