import { memo, useEffect, useLayoutEffect, useRef, useState } from 'react';
import { drawStrip, type StripPicture } from '../draw/drawStrip';
import { readPalette, type Palette } from '../draw/palette';
import { type Theme } from '#lib/format/levelRamp';

interface StripCanvasProps {
  picture: StripPicture;
  ratio: number;
  theme: Theme;
}

/** The strip's picture. Everything that it shows is also told in words and in a table beside it. */
export const StripCanvas = memo(function StripCanvas({ picture, ratio, theme }: StripCanvasProps) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const areFontsReady = useFonts();
  const { width, height } = picture.geometry;

  useLayoutEffect(() => {
    const context = canvas.current?.getContext('2d');
    if (!canvas.current || !context) return;
    context.setTransform(1, 0, 0, 1, 0, 0);
    context.clearRect(0, 0, canvas.current.width, canvas.current.height);
    drawStrip({ context, ratio, palette: paletteOf(theme) }, picture);
  }, [picture, ratio, theme, areFontsReady]);

  return (
    <canvas
      ref={canvas}
      width={Math.round(width * ratio)}
      height={Math.round(height * ratio)}
      style={{ width, height }}
      aria-hidden="true"
      className="block"
    />
  );
});

const palettes = new Map<Theme, Palette>();

/** The theme's colours, read from the page once each. */
function paletteOf(theme: Theme): Palette {
  const palette = palettes.get(theme) ?? readPalette(document.body);
  palettes.set(theme, palette);
  return palette;
}

function useFonts(): boolean {
  const [areReady, setReady] = useState(false);
  useEffect(() => {
    let isMounted = true;
    void document.fonts.ready.then(() => isMounted && setReady(true));
    return () => {
      isMounted = false;
    };
  }, []);
  return areReady;
}
