import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { lazy, Suspense, useDeferredValue, useMemo, useState } from 'react';
import type { Station } from '#lib/contracts/stations';
import { type Theme } from '#lib/format/levelRamp';
import { useNow } from '../strip/hooks/useNow';
import { useTheme } from '../strip/hooks/useTheme';
import { useLayerData, type MapPeriod } from './hooks/useLayerData';
import { useLayers } from './hooks/useLayers';
import { useMoment } from './hooks/useMoment';
import { usePast } from './hooks/usePast';
import { useStations } from './hooks/useStations';
import { dayOf, QUARTER_SEC } from './model/day';
import { layerMarks } from './model/layerMarks';
import { type MapLayer } from './model/layers';
import { stationsAsOf, stationsInUse, withExceedances, type ShownStation } from './model/shownStation';
import { LayerLists } from './parts/LayerLists';
import { LayerSwitches } from './parts/LayerSwitches';
import { MapLegend } from './parts/MapLegend';
import { MapPane } from './parts/MapPane';
import { StationList, type StationChoice } from './parts/StationList';
import { TimeControl } from './parts/TimeControl';

/** Fetched with the first station that is looked at: the map itself needs none of it. */
const GlancePanel = lazy(() =>
  import('./parts/GlancePanel').then((panel) => ({ default: panel.GlancePanel })),
);

const NONE: ShownStation[] = [];

export interface NetworkMapProps {
  slug: string;
  zone: string;
  /** Retired ones too: they are on maps of the past. */
  stations: Station[];
  /** When the page was made, epoch seconds. */
  madeAtSec: number;
  /** Beginning of the quarter-hour that the address asks for, epoch seconds; null: now. */
  momentSec: number | null;
  layers: MapLayer[];
  period: MapPeriod;
  /** The period as a query with its question mark; empty: the last 24 hours. */
  periodQuery: string;
  styleUrls: Record<Theme, string>;
}

/** The network now, or at a past moment: its stations on the map and in a list beside it. */
export function NetworkMap(props: NetworkMapProps) {
  const [client] = useState(() => new QueryClient());
  return (
    <QueryClientProvider client={client}>
      <NetworkAtMoment {...props} />
    </QueryClientProvider>
  );
}

function NetworkAtMoment({ slug, zone, period, periodQuery, styleUrls, ...given }: NetworkMapProps) {
  const live = useStations(slug, given.stations, given.madeAtSec);
  const theme = useTheme();
  const nowSec = useNow(5);
  const [atSec, showMoment] = useMoment(zone, given.momentSec);
  const [layers, toggleLayer] = useLayers(given.layers);
  const past = usePast(slug, atSec === null ? null : dayOf(atSec, zone, nowSec));
  const windAtSec = atSec === null ? null : atSec + QUARTER_SEC;
  const data = useLayerData({ slug, layers, period, windAtSec });
  const [active, setActive] = useState<string | null>(null);
  const [chosen, setChosen] = useState<string | null>(null);
  const choice: StationChoice = { active, chosen, onActive: setActive, onChoose: setChosen };
  const asOf = atSec === null ? stationsInUse(live.stations) : stationsAsOf(live.stations, past.data, atSec);
  const stations = data.exceedances ? withExceedances(asOf, data.exceedances) : asOf;
  // The map comes first, and the list of a large network when there is time.
  const listed = useDeferredValue(stations, NONE);
  const marks = useMemo(
    () => layerMarks(data.winds, data.complaints?.places),
    [data.winds, data.complaints?.places],
  );
  const shown = stations.find(({ code }) => code === chosen);
  const error = live.error ?? past.error;
  return (
    <div className="grid gap-5 desk:grid-cols-[minmax(0,1fr)_19rem]">
      <div>
        <div className="map-pane relative max-pad:h-[60vh] h-[clamp(22rem,calc(100vh-14rem),54rem)] overflow-hidden border border-line">
          <MapPane {...{ slug, stations, marks, styleUrls, choice, theme, zone, nowSec }} />
        </div>
        <TimeControl zone={zone} nowSec={nowSec} atSec={atSec} onShow={showMoment} />
        <div className="mt-1 flex flex-wrap justify-between gap-x-6">
          <MapLegend theme={theme} isPast={atSec !== null} />
          <LayerSwitches layers={layers} onToggle={toggleLayer} />
        </div>
      </div>
      <div className="space-y-5">
        {error && (
          <p role="status" className="border-l-3 border-ochre pl-3 text-table">
            The levels cannot be renewed at the moment: {error.message}
          </p>
        )}
        {shown && (
          <Suspense fallback={null}>
            <GlancePanel
              key={shown.code}
              slug={slug}
              station={shown}
              zone={zone}
              nowSec={nowSec}
              onClose={() => setChosen(null)}
            />
          </Suspense>
        )}
        <StationList {...{ slug, stations: listed, periodQuery, choice, zone, nowSec }} />
        <LayerLists slug={slug} data={data} />
      </div>
    </div>
  );
}
