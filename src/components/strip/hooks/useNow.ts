import { useEffect, useState } from 'react';

/**
 * The time in epoch seconds, renewed every `everySec`. `madeSec`: when the page was made, which is now until the first renewal, so
 * that the server and the browser make the same first picture.
 */
export function useNow(everySec: number, madeSec?: number): number {
  const [nowSec, setNowSec] = useState(() => madeSec ?? Date.now() / 1000);
  useEffect(() => {
    const timer = setInterval(() => setNowSec(Date.now() / 1000), everySec * 1000);
    return () => clearInterval(timer);
  }, [everySec]);
  return nowSec;
}
