import { useEffect, useRef, useState } from 'react';
import type { LiveInterval } from '#lib/contracts/live';
import { LIVE_EVENT, LIVE_OVER_EVENT } from '#lib/contracts/liveEvents';

/** A browser opens a broken stream again by itself, but not after an answer such as 503: then we do. */
const REOPENED_AFTER_MS = 15_000;

/**
 * Listens to what a network's stations measure while the page is in view, and answers whether it hears anything: where it does
 * not, the caller goes on asking from time to time.
 */
export function useLive(slug: string, onInterval: (interval: LiveInterval) => void): boolean {
  const [isHeard, setHeard] = useState(false);
  const told = useRef(onInterval);
  useEffect(() => {
    told.current = onInterval;
  });

  useEffect(() => {
    let source: EventSource | null = null;
    let again: ReturnType<typeof setTimeout> | undefined;
    const stop = () => {
      clearTimeout(again);
      source?.close();
      source = null;
      setHeard(false);
    };
    const open = () => {
      const opened = new EventSource(`/api/v1/networks/${slug}/live`);
      opened.onopen = () => setHeard(true);
      opened.onerror = () => {
        setHeard(false);
        if (opened.readyState !== EventSource.CLOSED) return;
        source = null;
        again = setTimeout(follow, REOPENED_AFTER_MS);
      };
      opened.addEventListener(LIVE_EVENT, (event: MessageEvent<string>) =>
        told.current(JSON.parse(event.data) as LiveInterval),
      );
      opened.addEventListener(LIVE_OVER_EVENT, stop);
      return opened;
    };
    const begin = () => {
      clearTimeout(again);
      source ??= open();
    };
    // A page out of view holds no connection: a browser has few of them for each server.
    const follow = () => (document.hidden ? stop() : begin());
    follow();
    document.addEventListener('visibilitychange', follow);
    return () => {
      document.removeEventListener('visibilitychange', follow);
      stop();
    };
  }, [slug]);

  return isHeard;
}
