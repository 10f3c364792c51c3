import { lazy, Suspense, useState } from 'react';
import type { Station } from '#lib/contracts/stations';
import { type Theme } from '#lib/format/levelRamp';
import { hasWebGl } from '../webgl';
import { StaticPlan } from './StaticPlan';
import { type StationChoice } from './StationList';

const MapCanvas = lazy(() => import('./MapCanvas'));

export interface MapPaneProps {
  styleUrls: Record<Theme, string>;
  stations: readonly Station[];
  choice: StationChoice;
  theme: Theme;
  zone: string;
  nowSec: number;
}

/** The map, or a plan of the same stations where the browser has no WebGL. */
export function MapPane(props: MapPaneProps) {
  const [canDrawMap] = useState(hasWebGl);
  if (!canDrawMap) return <StaticPlan {...props} />;
  return (
    <Suspense fallback={<div className="absolute inset-0 bg-sunk" />}>
      <MapCanvas {...props} />
    </Suspense>
  );
}
