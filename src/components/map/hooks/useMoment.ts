import { useCallback, useState } from 'react';
import { urlInstant } from '#lib/time/urlPeriod';
import { keepInUrl } from '../model/keepInUrl';

/** The beginning of the quarter-hour that the map shows, epoch seconds, or null for now; the address carries it as `at`. */
export function useMoment(zone: string, initialSec: number | null) {
  const [atSec, setAtSec] = useState(initialSec);
  const show = useCallback(
    (sec: number | null) => {
      setAtSec(sec);
      keepInUrl('at', sec === null ? null : urlInstant(sec, zone));
    },
    [zone],
  );
  return [atSec, show] as const;
}
