import { useCallback, useSyncExternalStore } from 'react';
import { useMap } from 'react-map-gl/maplibre';
import { type Place } from '../model/planProjection';
import { type MapPaneProps } from './MapPane';
import { SlipLayer } from './SlipLayer';

const SPREAD_MARGIN_PX = 120;

/** The slips where the map shows their stations, following it as it moves. */
export function ProjectedSlips({ stations, ...props }: Omit<MapPaneProps, 'styleUrls'>) {
  const { current: map } = useMap();
  const subscribe = useCallback(
    (changed: () => void) => {
      map?.on('move', changed);
      map?.on('resize', changed);
      return () => {
        map?.off('move', changed);
        map?.off('resize', changed);
      };
    },
    [map],
  );
  const place = useSyncExternalStore(subscribe, () => {
    if (!map) return '';
    const { clientWidth, clientHeight } = map.getContainer();
    const { lng, lat } = map.getCenter();
    // Where the centre is drawn tells the size that the map reckons with, which follows its element's a little later.
    const { x, y } = map.project([lng, lat]);
    return [lng, lat, map.getZoom(), clientWidth, clientHeight, x, y].join(' ');
  });
  if (!map || place === '') return null;
  const { clientWidth, clientHeight } = map.getContainer();
  const frame = { width: clientWidth, height: clientHeight };
  const pointOf = ({ longitude, latitude }: Place) => {
    const { x, y } = map.project([longitude, latitude]);
    return { x, y };
  };
  const points = stations.map((station) => ({ id: station.code, ...pointOf(station) }));
  const markPoints = props.marks.map((mark) => ({ id: mark.id, ...pointOf(mark) }));

  const spread = (codes: string[]) => {
    const held = stations.filter(({ code }) => codes.includes(code));
    const longitudes = held.map(({ longitude }) => longitude);
    const latitudes = held.map(({ latitude }) => latitude);
    map.fitBounds(
      [
        [Math.min(...longitudes), Math.min(...latitudes)],
        [Math.max(...longitudes), Math.max(...latitudes)],
      ],
      { padding: SPREAD_MARGIN_PX, maxZoom: 17.5 },
    );
  };

  return <SlipLayer {...props} {...{ stations, points, markPoints, frame }} onSpread={spread} />;
}
