import { chromium, type Browser } from 'playwright-core';

export const CHROMIUM_FLAGS = [
  '--headless=new',
  '--no-sandbox',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  // Pages are drawn by the processor, as on a machine without a GPU, and so are WebGL's contexts.
  '--disable-gpu',
  '--enable-unsafe-swiftshader',
];

/** Starts the machine's Chromium without a window and without a GPU. */
export function launchChromium(): Promise<Browser> {
  return chromium.launch({ executablePath: '/usr/bin/chromium', args: CHROMIUM_FLAGS });
}
