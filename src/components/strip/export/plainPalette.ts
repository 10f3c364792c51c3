import { type Palette } from '../draw/palette';

/** The palette in colours that every program reads: red, green, blue and opacity instead of what the theme is written in. */
export function plainPalette(palette: Palette): Palette {
  const canvas = document.createElement('canvas');
  canvas.width = canvas.height = 1;
  const context = canvas.getContext('2d', { willReadFrequently: true });
  if (!context) return palette;
  const plain = (colour: string) => {
    context.clearRect(0, 0, 1, 1);
    context.fillStyle = colour;
    context.fillRect(0, 0, 1, 1);
    const [red, green, blue, alpha = 255] = context.getImageData(0, 0, 1, 1).data;
    return alpha === 255
      ? `rgb(${red}, ${green}, ${blue})`
      : `rgba(${red}, ${green}, ${blue}, ${Math.round((alpha / 255) * 1000) / 1000})`;
  };
  return Object.fromEntries(
    Object.entries(palette).map(([name, colour]: [string, string]) => [name, plain(colour)]),
  ) as Record<keyof Palette, string>;
}
