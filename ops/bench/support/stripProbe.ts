/** What the probe in the page has seen, milliseconds since the navigation began; null: not yet. */
export interface Seen {
  /** The spectrogram has colours in its middle. */
  paintedMs: number | null;
  /** The reading slip shows the server's figures, and nothing is being fetched. */
  completeMs: number | null;
  /** Sum of the layout shifts that no person caused. */
  layoutShift: number;
}

declare global {
  interface Window {
    seen?: Seen;
  }
}

/** Watches a station's page from its beginning on, frame by frame; runs in the page, so it refers to nothing outside. */
export function watchStrip(): void {
  const seen: Seen = { paintedMs: null, completeMs: null, layoutShift: 0 };
  window.seen = seen;
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries()) {
      const { hadRecentInput, value } = entry as PerformanceEntry & {
        hadRecentInput: boolean;
        value: number;
      };
      if (!hadRecentInput) seen.layoutShift += value;
    }
  }).observe({ type: 'layout-shift', buffered: true });
  const isPainted = () => {
    const canvas = document.querySelector<HTMLCanvasElement>('[data-strip] canvas');
    const [, , , alpha] = canvas?.getContext('2d')?.getImageData(canvas.width >> 1, 120, 1, 1).data ?? [];
    return alpha === 255;
  };
  const isComplete = () => {
    const slip = document.querySelector('aside.slip dl')?.closest('aside')?.textContent ?? '';
    const isFetching = [...document.querySelectorAll('p[aria-live]')].some(
      ({ textContent }) => textContent === 'fetching …',
    );
    return /covered/.test(slip) && !slip.includes('from the screen') && !isFetching;
  };
  const look = () => {
    if (seen.paintedMs === null && isPainted()) seen.paintedMs = performance.now();
    if (seen.paintedMs !== null && isComplete()) seen.completeMs = performance.now();
    if (seen.completeMs === null) requestAnimationFrame(look);
  };
  requestAnimationFrame(look);
}

/** Milliseconds of each frame while the strip zooms in and out, or pans, at every frame; runs in the page. */
export async function framesWhile(act: 'zoom' | 'pan'): Promise<number[]> {
  const plot = document.querySelector<HTMLElement>('[role="application"]');
  if (!plot) throw new Error('There is no strip.');
  const { left, top, width } = plot.getBoundingClientRect();
  const frame = () => new Promise<number>((done) => requestAnimationFrame(done));
  const times = [await frame()];
  for (let n = 0; n < 120; n += 1) {
    const sign = n < 60 ? -1 : 1;
    const move = act === 'zoom' ? { deltaY: sign * 8, ctrlKey: true } : { deltaX: sign * 12 };
    const at = { clientX: left + width / 2, clientY: top + 100, bubbles: true, cancelable: true };
    plot.dispatchEvent(new WheelEvent('wheel', { ...at, ...move }));
    times.push(await frame());
  }
  return times.slice(1).map((time, n) => time - (times[n] ?? time));
}

/** What a drag over the strip takes; milliseconds. Runs in the page. */
export interface DragTimes {
  /** From the pointer's move to the frame whose slip shows the new stretch with figures from the screen. */
  localMs: number;
  /** Frames until then: 1 is the same frame. */
  localFrames: number;
  /** From letting go until the slip shows the server's figures. */
  serverMs: number;
}

/** Drags over the strip to a place (a share of its width) that no drag ended at before, whose figures are not known yet. */
export async function dragOver(endShare: number): Promise<DragTimes> {
  const target = document.querySelector<HTMLElement>('[role="application"] .cursor-crosshair');
  if (!target) throw new Error('There is no strip.');
  target.setPointerCapture = () => undefined;
  const box = target.getBoundingClientRect();
  const frame = () => new Promise<number>((done) => requestAnimationFrame(done));
  const point = (type: string, share: number, y: number) =>
    target.dispatchEvent(
      new PointerEvent(type, {
        clientX: box.left + share * box.width,
        clientY: box.top + y,
        button: 0,
        pointerId: 1,
        bubbles: true,
      }),
    );
  const slip = () => document.querySelector('aside.slip dl')?.closest('aside')?.textContent ?? '';
  point('pointerdown', 0.4, 60);
  point('pointermove', 0.42, 70);
  await frame();
  const before = slip();
  const movedMs = performance.now();
  point('pointermove', endShare, 130);
  let localFrames = 0;
  while (slip() === before || !slip().includes('from the screen')) {
    await frame();
    localFrames += 1;
  }
  const localMs = performance.now() - movedMs;
  const releasedMs = performance.now();
  point('pointerup', endShare, 130);
  while (slip().includes('from the screen')) await frame();
  return { localMs, localFrames: Math.max(1, localFrames), serverMs: performance.now() - releasedMs };
}
