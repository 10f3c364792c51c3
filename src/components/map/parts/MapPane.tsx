import { lazy, Suspense, useState } from 'react';
import { type Theme } from '#lib/format/levelRamp';
import { type LayerMark } from '../model/layerMarks';
import { type ShownStation } from '../model/shownStation';
import { knowsWebGl } from '../webgl';
import { StaticPlan } from './StaticPlan';
import { type StationChoice } from './StationList';

const MapCanvas = lazy(() => import('./MapCanvas'));

export interface MapPaneProps {
  styleUrls: Record<Theme, string>;
  slug: string;
  stations: readonly ShownStation[];
  marks: readonly LayerMark[];
  choice: StationChoice;
  theme: Theme;
  zone: string;
  nowSec: number;
}

/** The map, or a plan of the same stations where the browser has no WebGL. */
export function MapPane(props: MapPaneProps) {
  const [canDrawMap, setCanDrawMap] = useState(knowsWebGl);
  if (!canDrawMap) return <StaticPlan {...props} />;
  return (
    <Suspense fallback={<div className="absolute inset-0 bg-sunk" />}>
      <MapCanvas {...props} onImpossible={() => setCanDrawMap(false)} />
    </Suspense>
  );
}
