import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useState } from 'react';
import type { Station } from '#lib/contracts/stations';
import { type Theme } from '#lib/format/levelRamp';
import { useNow } from '../strip/hooks/useNow';
import { useTheme } from '../strip/hooks/useTheme';
import { useStations } from './hooks/useStations';
import { GlancePanel } from './parts/GlancePanel';
import { MapLegend } from './parts/MapLegend';
import { MapPane } from './parts/MapPane';
import { StationList, type StationChoice } from './parts/StationList';

export interface NetworkMapProps {
  slug: string;
  zone: string;
  stations: Station[];
  /** When the page was made, epoch seconds. */
  atSec: number;
  styleUrls: Record<Theme, string>;
}

/** The network now: its stations on the map and in a list beside it, the levels renewed as they arrive. */
export function NetworkMap(props: NetworkMapProps) {
  const [client] = useState(() => new QueryClient());
  return (
    <QueryClientProvider client={client}>
      <NetworkNow {...props} />
    </QueryClientProvider>
  );
}

function NetworkNow({ slug, zone, stations: initial, atSec, styleUrls }: NetworkMapProps) {
  const { stations, error } = useStations(slug, initial, atSec);
  const theme = useTheme();
  const nowSec = useNow(5);
  const [active, setActive] = useState<string | null>(null);
  const [chosen, setChosen] = useState<string | null>(null);
  const choice: StationChoice = { active, chosen, onActive: setActive, onChoose: setChosen };
  const shown = stations.find(({ code }) => code === chosen);
  return (
    <div className="grid gap-5 desk:grid-cols-[minmax(0,1fr)_19rem]">
      <div>
        <div className="map-pane relative max-pad:h-[60vh] h-[clamp(22rem,calc(100vh-10rem),54rem)] overflow-hidden border border-line">
          <MapPane {...{ stations, styleUrls, choice, theme, zone, nowSec }} />
        </div>
        <MapLegend theme={theme} />
      </div>
      <div className="space-y-5">
        {error && (
          <p role="status" className="border-l-3 border-ochre pl-3 text-table">
            The levels cannot be renewed at the moment: {error.message}
          </p>
        )}
        {shown && (
          <GlancePanel
            key={shown.code}
            slug={slug}
            station={shown}
            zone={zone}
            nowSec={nowSec}
            onClose={() => setChosen(null)}
          />
        )}
        <StationList stations={stations} choice={choice} zone={zone} nowSec={nowSec} />
      </div>
    </div>
  );
}
