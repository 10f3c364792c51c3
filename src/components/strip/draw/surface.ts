import { type Palette } from './palette';
import { type Rect } from './geometry';

/** What the drawing needs of a canvas, so that a drawing of another kind can take its place. */
export interface DrawContext {
  fillStyle: string | CanvasGradient | CanvasPattern;
  strokeStyle: string | CanvasGradient | CanvasPattern;
  lineWidth: number;
  lineJoin: CanvasLineJoin;
  font: string;
  textAlign: CanvasTextAlign;
  textBaseline: CanvasTextBaseline;
  imageSmoothingEnabled: boolean;
  setTransform(a: number, b: number, c: number, d: number, e: number, f: number): void;
  save(): void;
  restore(): void;
  beginPath(): void;
  closePath(): void;
  rect(x: number, y: number, width: number, height: number): void;
  moveTo(x: number, y: number): void;
  lineTo(x: number, y: number): void;
  clip(): void;
  stroke(): void;
  fill(): void;
  setLineDash(segments: number[]): void;
  fillRect(x: number, y: number, width: number, height: number): void;
  strokeRect(x: number, y: number, width: number, height: number): void;
  fillText(text: string, x: number, y: number): void;
  measureText(text: string): { width: number };
  drawImage(image: HTMLCanvasElement, x: number, y: number, width: number, height: number): void;
  createPattern(image: HTMLCanvasElement, repetition: string | null): CanvasPattern | null;
}

/** A canvas being drawn on, with what every part of the drawing needs. Coordinates are CSS pixels unless told otherwise. */
export interface Surface {
  context: DrawContext;
  /** Device pixels in a CSS pixel. */
  ratio: number;
  palette: Palette;
  /** What to fill with where nothing was measured; a pattern of diagonal lines is made where left out. */
  hatchFill?: string;
}

const FONT = "'Noto Sans', sans-serif";

/** Rectangle in device pixels, on whole ones. */
export function onDevice(rect: Rect, ratio: number): Rect {
  const x = Math.round(rect.x * ratio);
  const y = Math.round(rect.y * ratio);
  return {
    x,
    y,
    width: Math.round((rect.x + rect.width) * ratio) - x,
    height: Math.round((rect.y + rect.height) * ratio) - y,
  };
}

/** Runs `draw` in device pixels, clipped to a rectangle, the origin at its top left. */
export function within(surface: Surface, rect: Rect, draw: (device: Rect) => void): void {
  const { context, ratio } = surface;
  const device = onDevice(rect, ratio);
  context.save();
  context.setTransform(1, 0, 0, 1, device.x, device.y);
  context.beginPath();
  context.rect(0, 0, device.width, device.height);
  context.clip();
  draw(device);
  context.restore();
}

interface TextStyle {
  colour: string;
  align?: CanvasTextAlign;
  baseline?: CanvasTextBaseline;
  sizePx?: number;
  weight?: number;
  /** Colour to lay behind the letters, so that they are legible over lines. */
  plate?: string;
}

export function writeText(surface: Surface, text: string, x: number, y: number, style: TextStyle): void {
  const { context } = surface;
  context.font = `${style.weight ?? 400} ${style.sizePx ?? 12}px ${FONT}`;
  context.textAlign = style.align ?? 'left';
  context.textBaseline = style.baseline ?? 'middle';
  if (style.plate) {
    const width = context.measureText(text).width + 6;
    context.fillStyle = style.plate;
    context.fillRect(style.align === 'center' ? x - width / 2 : x - 3, y - 8, width, 16);
  }
  context.fillStyle = style.colour;
  context.fillText(text, x, y);
}

/** Width of a text of 12 px, CSS pixels. */
export function textWidth(surface: Surface, text: string): number {
  surface.context.font = `400 12px ${FONT}`;
  return surface.context.measureText(text).width;
}
