import type { Station } from '#lib/contracts/stations';
import { formatLevelDb } from '#lib/format/levels';
import { stateWords } from '../../stations/stateWords';
import { averagingOf, markStateOf } from '../model/stationWords';
import { StateShape } from './StateShape';

/** What slips on the map and rows of the list share. */
export interface StationChoice {
  /** The one that the pointer or the focus is on. */
  active: string | null;
  /** The one whose glance panel is open. */
  chosen: string | null;
  onActive: (code: string | null) => void;
  onChoose: (code: string) => void;
}

interface StationListProps {
  stations: readonly Station[];
  choice: StationChoice;
  zone: string;
  nowSec: number;
}

/** The same stations as on the map, for the keyboard and for those who do not see the map. */
export function StationList({ stations, choice, zone, nowSec }: StationListProps) {
  return (
    <ul className="border-t border-line text-table">
      {stations.map((station) => (
        <li key={station.code} className="border-b border-line">
          <button
            type="button"
            aria-pressed={choice.chosen === station.code}
            onClick={() => choice.onChoose(station.code)}
            onPointerEnter={() => choice.onActive(station.code)}
            onPointerLeave={() => choice.onActive(null)}
            onFocus={() => choice.onActive(station.code)}
            onBlur={() => choice.onActive(null)}
            className={`grid w-full grid-cols-[auto_1fr_auto] items-baseline gap-x-2 px-1.5 py-1.5 text-left aria-pressed:bg-estuary-wash ${choice.active === station.code ? 'bg-ink/5' : ''}`}
          >
            <StateShape state={markStateOf(station)} sizePx={11} />
            <span>
              <span className="font-medium">{station.name}</span>{' '}
              <span className="text-ink-soft">{station.code}</span>
            </span>
            <CurrentLevel station={station} />
            <span className="col-start-2 col-end-4 text-small text-ink-soft">
              {stateWords(station, zone, nowSec)}
              {station.overLimit && <span className="text-rust"> · over a limit</span>}
            </span>
          </button>
        </li>
      ))}
    </ul>
  );
}

function CurrentLevel({ station }: { station: Station }) {
  if (station.state !== 'live' || !station.latest) return <span className="text-ink-soft">—</span>;
  return (
    <span className="tabular-nums">
      {formatLevelDb(station.latest.LAeq)} <span className="text-ink-soft">dB, {averagingOf(station)}</span>
    </span>
  );
}
