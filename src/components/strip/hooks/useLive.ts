import { useEffect, useRef, useState } from 'react';
import type { LiveInterval } from '#lib/contracts/live';
import { LIVE_EVENT, LIVE_OVER_EVENT } from '#lib/contracts/liveEvents';

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
    const stop = () => {
      source?.close();
      source = null;
      setHeard(false);
    };
    const begin = () => {
      source ??= new EventSource(`/api/v1/networks/${slug}/live`);
      source.onopen = () => setHeard(true);
      source.onerror = () => setHeard(false);
      source.addEventListener(LIVE_EVENT, (event: MessageEvent<string>) =>
        told.current(JSON.parse(event.data) as LiveInterval),
      );
      source.addEventListener(LIVE_OVER_EVENT, stop);
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
