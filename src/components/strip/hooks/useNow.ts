import { useEffect, useState } from 'react';

/** The time in epoch seconds, renewed every `everySec`. */
export function useNow(everySec: number): number {
  const [nowSec, setNowSec] = useState(() => Date.now() / 1000);
  useEffect(() => {
    const timer = setInterval(() => setNowSec(Date.now() / 1000), everySec * 1000);
    return () => clearInterval(timer);
  }, [everySec]);
  return nowSec;
}
