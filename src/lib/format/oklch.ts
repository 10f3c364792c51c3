/** A colour in OKLCH: lightness 0–1, chroma, hue in degrees. */
export interface Oklch {
  lightness: number;
  chroma: number;
  hueDeg: number;
}

export type Rgb = [red: number, green: number, blue: number];

/**
 * Linear-light sRGB of an OKLCH colour; a component outside 0–1 lies outside the gamut.
 * Matrices: Björn Ottosson, "A perceptual color space for image processing" (2020), as in CSS Color 4.
 */
export function linearRgbOf({ lightness, chroma, hueDeg }: Oklch): Rgb {
  const hue = (hueDeg * Math.PI) / 180;
  const a = chroma * Math.cos(hue);
  const b = chroma * Math.sin(hue);
  const l = (lightness + 0.3963377774 * a + 0.2158037573 * b) ** 3;
  const m = (lightness - 0.1055613458 * a - 0.0638541728 * b) ** 3;
  const s = (lightness - 0.0894841775 * a - 1.291485548 * b) ** 3;
  return [
    4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s,
    -1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s,
    -0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s,
  ];
}

const SLACK = 1e-6;

/** sRGB bytes of a colour. Outside the gamut chroma gives way and lightness stays, so that an order of lightness holds. */
export function rgbBytesOf(colour: Oklch): Rgb {
  return inGamut(colour).map(byteOfLinear) as Rgb;
}

function inGamut(colour: Oklch): Rgb {
  const whole = linearRgbOf(colour);
  if (isInGamut(whole)) return whole;
  let low = 0;
  let high = colour.chroma;
  while (high - low > 1e-5) {
    const chroma = (low + high) / 2;
    if (isInGamut(linearRgbOf({ ...colour, chroma }))) low = chroma;
    else high = chroma;
  }
  return linearRgbOf({ ...colour, chroma: low });
}

const isInGamut = (rgb: Rgb) => rgb.every((value) => value >= -SLACK && value <= 1 + SLACK);

function byteOfLinear(linear: number): number {
  const light = Math.min(1, Math.max(0, linear));
  const encoded = light <= 0.0031308 ? 12.92 * light : 1.055 * light ** (1 / 2.4) - 0.055;
  return Math.round(encoded * 255);
}

/** Linear light 0–1 of an sRGB byte (IEC 61966-2-1). */
function linearOfByte(byte: number): number {
  const encoded = byte / 255;
  return encoded <= 0.04045 ? encoded / 12.92 : ((encoded + 0.055) / 1.055) ** 2.4;
}

/** OKLab lightness of sRGB bytes. */
export function lightnessOf(rgb: readonly number[]): number {
  const [r, g, b] = [0, 1, 2].map((at) => linearOfByte(rgb[at] ?? 0)) as Rgb;
  const l = Math.cbrt(0.4122214708 * r + 0.5363325363 * g + 0.0514459929 * b);
  const m = Math.cbrt(0.2119034982 * r + 0.6806995451 * g + 0.1073969566 * b);
  const s = Math.cbrt(0.0883024619 * r + 0.2817188376 * g + 0.6299787005 * b);
  return 0.2104542553 * l + 0.793617785 * m - 0.0040720468 * s;
}
