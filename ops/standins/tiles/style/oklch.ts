/** A colour by lightness (0–1), chroma and hue (degrees) of OKLCH (B. Ottosson, 2020). */
export type Oklch = readonly [lightness: number, chroma: number, hueDegrees: number];

const clamp = (value: number) => Math.max(0, Math.min(1, value));
const toSrgb = (linear: number) =>
  linear <= 0.0031308 ? 12.92 * linear : 1.055 * linear ** (1 / 2.4) - 0.055;

/** The sRGB colour as #rrggbb, because map styles know no OKLCH; what sRGB cannot show is clipped. */
export function hex([lightness, chroma, hueDegrees]: Oklch): string {
  const hue = (hueDegrees * Math.PI) / 180;
  const a = chroma * Math.cos(hue);
  const b = chroma * Math.sin(hue);
  const long = (lightness + 0.3963377774 * a + 0.2158037573 * b) ** 3;
  const medium = (lightness - 0.1055613458 * a - 0.0638541728 * b) ** 3;
  const short = (lightness - 0.0894841775 * a - 1.291485548 * b) ** 3;
  const rgb = [
    4.0767416621 * long - 3.3077115913 * medium + 0.2309699292 * short,
    -1.2684380046 * long + 2.6097574011 * medium - 0.3413193965 * short,
    -0.0041960863 * long - 0.7034186147 * medium + 1.707614701 * short,
  ];
  const digits = rgb.map((linear) => Math.round(clamp(toSrgb(clamp(linear))) * 255));
  return `#${digits.map((digit) => digit.toString(16).padStart(2, '0')).join('')}`;
}
