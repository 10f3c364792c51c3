import { useRef } from 'react';
import { useElementSize } from '../hooks/useElementSize';
import { planPoints } from '../model/planProjection';
import { type MapPaneProps } from './MapPane';
import { SlipLayer } from './SlipLayer';

const MARGIN_PX = 80;

/** The stations as they lie to one another, north up, where the browser cannot draw the map. */
export function StaticPlan(props: Omit<MapPaneProps, 'styleUrls'>) {
  const host = useRef<HTMLDivElement>(null);
  const size = useElementSize(host);
  const { stations, marks } = props;
  const places = [...stations, ...marks.map(({ id, ...place }) => ({ ...place, code: id }))];
  const points = planPoints(places, size, MARGIN_PX);
  return (
    <div ref={host} className="absolute inset-0 bg-sunk">
      <p className="absolute top-2 left-3 text-small text-ink-soft">
        North is up. This browser cannot draw the map; the stations are placed as they lie to one another.
      </p>
      {size.width > 0 && (
        <SlipLayer
          {...props}
          frame={size}
          points={points.slice(0, stations.length)}
          markPoints={points.slice(stations.length)}
          onSpread={([first = '']) => props.choice.onChoose(first)}
        />
      )}
    </div>
  );
}
