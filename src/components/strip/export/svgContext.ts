import { escapeHtml } from '#lib/format/escapeHtml';
import { type DrawContext } from '../draw/surface';

interface Saved {
  scale: number;
  left: number;
  top: number;
  dash: string;
  /** Groups that were opened for clipping and end with this state. */
  openGroups: number;
}

const FONT = /^(\d+) ([\d.]+)px (.+)$/;
/** From the middle of a line of text down to its baseline, in its size: programs differ on how they centre it themselves. */
const BASELINE_EM = 0.35;
const ANCHORS: Partial<Record<CanvasTextAlign, string>> = { center: 'middle', right: 'end', end: 'end' };

/**
 * Takes the strip's drawing as a canvas does and makes SVG elements of it, in device pixels. It knows what the strip draws with:
 * scaling and moving, clipping to rectangles, rectangles, lines, triangles, text and one picture.
 */
export class SvgContext implements DrawContext {
  fillStyle: DrawContext['fillStyle'] = '#000';
  strokeStyle: DrawContext['strokeStyle'] = '#000';
  lineWidth = 1;
  lineJoin: CanvasLineJoin = 'miter';
  font = '400 12px sans-serif';
  textAlign: CanvasTextAlign = 'left';
  textBaseline: CanvasTextBaseline = 'middle';
  imageSmoothingEnabled = false;

  private readonly parts: string[] = [];
  private state: Saved = { scale: 1, left: 0, top: 0, dash: '', openGroups: 0 };
  private readonly saved: Saved[] = [];
  private path = '';
  private clips = 0;
  /** Rectangles of one colour that are being put into one path. */
  private rects = '';
  private rectsFill = '';

  /** @param widthOf Width of a text in a canvas font, in that font's pixels. */
  constructor(private readonly widthOf: (text: string, font: string) => number) {}

  /** The elements drawn so far. */
  elements(): string {
    this.endRects();
    return this.parts.join('\n');
  }

  setTransform(scale: number, _b: number, _c: number, _d: number, left: number, top: number): void {
    this.state = { ...this.state, scale, left, top };
  }

  save(): void {
    this.saved.push(this.state);
    this.state = { ...this.state, openGroups: 0 };
  }

  restore(): void {
    this.endRects();
    this.parts.push('</g>'.repeat(this.state.openGroups));
    this.state = this.saved.pop() ?? this.state;
  }

  beginPath(): void {
    this.path = '';
  }

  closePath(): void {
    this.path += 'z';
  }

  rect(x: number, y: number, width: number, height: number): void {
    this.path += this.rectPath(x, y, width, height);
  }

  moveTo(x: number, y: number): void {
    this.path += `M${this.x(x)} ${this.y(y)}`;
  }

  lineTo(x: number, y: number): void {
    this.path += `L${this.x(x)} ${this.y(y)}`;
  }

  clip(): void {
    this.endRects();
    this.clips += 1;
    this.parts.push(
      `<clipPath id="clip-${this.clips}"><path d="${this.path}"/></clipPath>`,
      `<g clip-path="url(#clip-${this.clips})">`,
    );
    this.state = { ...this.state, openGroups: this.state.openGroups + 1 };
  }

  stroke(): void {
    this.write(`<path d="${this.path}" ${this.strokeAttributes()}/>`);
  }

  fill(): void {
    this.write(`<path d="${this.path}" fill="${String(this.fillStyle)}"/>`);
  }

  setLineDash(segments: number[]): void {
    const { scale } = this.state;
    const dash =
      segments.length > 0 ? ` stroke-dasharray="${segments.map((n) => round(n * scale)).join(' ')}"` : '';
    this.state = { ...this.state, dash };
  }

  fillRect(x: number, y: number, width: number, height: number): void {
    const fill = String(this.fillStyle);
    if (this.rectsFill !== fill) this.endRects();
    this.rectsFill = fill;
    this.rects += this.rectPath(x, y, width, height);
  }

  strokeRect(x: number, y: number, width: number, height: number): void {
    this.write(`<path d="${this.rectPath(x, y, width, height)}" ${this.strokeAttributes()}/>`);
  }

  fillText(text: string, x: number, y: number): void {
    const [, weight = '400', size = '12', family = 'sans-serif'] = FONT.exec(this.font) ?? [];
    const sizePx = Number(size) * this.state.scale;
    const baseline = this.textBaseline === 'middle' ? sizePx * BASELINE_EM : 0;
    const anchor = ANCHORS[this.textAlign];
    this.write(
      `<text x="${this.x(x)}" y="${round(this.y(y) + baseline)}" font-family="${escapeHtml(family)}" ` +
        `font-size="${round(sizePx)}" font-weight="${weight}"${anchor ? ` text-anchor="${anchor}"` : ''} ` +
        `fill="${String(this.fillStyle)}">${escapeHtml(text)}</text>`,
    );
  }

  measureText(text: string): { width: number } {
    return { width: this.widthOf(text, this.font) };
  }

  drawImage(image: HTMLCanvasElement, x: number, y: number, width: number, height: number): void {
    const { scale } = this.state;
    this.write(
      `<image x="${this.x(x)}" y="${this.y(y)}" width="${round(width * scale)}" height="${round(height * scale)}" ` +
        `preserveAspectRatio="none" style="image-rendering:pixelated" href="${image.toDataURL('image/png')}"/>`,
    );
  }

  /** Patterns come with the surface, as a fill of their own. */
  createPattern(): null {
    return null;
  }

  private write(element: string): void {
    this.endRects();
    this.parts.push(element);
  }

  private endRects(): void {
    if (this.rects) this.parts.push(`<path d="${this.rects}" fill="${this.rectsFill}"/>`);
    this.rects = '';
  }

  private strokeAttributes(): string {
    const width = round(this.lineWidth * this.state.scale);
    return (
      `fill="none" stroke="${String(this.strokeStyle)}" stroke-width="${width}" ` +
      `stroke-linejoin="${this.lineJoin}"${this.state.dash}`
    );
  }

  private rectPath(x: number, y: number, width: number, height: number): string {
    const { scale } = this.state;
    const across = round(width * scale);
    return `M${this.x(x)} ${this.y(y)}h${across}v${round(height * scale)}h${-across}z`;
  }

  private x(x: number): number {
    return round(x * this.state.scale + this.state.left);
  }

  private y(y: number): number {
    return round(y * this.state.scale + this.state.top);
  }
}

function round(value: number): number {
  return Math.round(value * 100) / 100;
}
