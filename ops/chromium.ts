import { chromium, type Browser } from 'playwright-core';

const FLAGS = [
  '--headless=new',
  '--no-sandbox',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];
const SOFTWARE_WEBGL = ['--use-gl=angle', '--use-angle=swiftshader', '--enable-unsafe-swiftshader'];
const NO_GPU = ['--disable-gpu'];

/**
 * Starts the machine's Chromium without a window, with WebGL by software. `webGl: false`: without WebGL, as on a machine without
 * a GPU; otherwise every frame of every page goes through a GPU that is software, which costs ten times as much as drawing it.
 */
export function launchChromium({ webGl = true }: { webGl?: boolean } = {}): Promise<Browser> {
  const args = [...FLAGS, ...(webGl ? SOFTWARE_WEBGL : NO_GPU)];
  return chromium.launch({ executablePath: '/usr/bin/chromium', args });
}
