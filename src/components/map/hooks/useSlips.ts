import { useMemo } from 'react';
import { placeSlips, type PlacedSlip, type Size, type SlipPoint } from '../model/placeSlips';

interface Arrangement {
  points: readonly SlipPoint[];
  frame: Size;
  avoid: readonly SlipPoint[];
}

/** Slips of some points, arranged anew only when a place has changed: not whenever a level arrives. */
export function useSlips(arrangement: Arrangement, slip: Size): PlacedSlip[] {
  const key = JSON.stringify(arrangement);
  return useMemo(() => {
    const { points, frame, avoid } = JSON.parse(key) as Arrangement;
    return placeSlips(points, slip, frame, avoid);
  }, [key, slip]);
}
