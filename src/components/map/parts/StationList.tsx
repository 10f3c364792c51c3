import { formatLevelDb } from '#lib/format/levels';
import { type ShownStation } from '../model/shownStation';
import { averagingOf, exceedanceWords, markStateOf, stateLine } from '../model/stationWords';
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
  slug: string;
  stations: readonly ShownStation[];
  /** Query of the period that exceedances are counted in, with its question mark; empty: the last 24 hours. */
  periodQuery: string;
  choice: StationChoice;
  zone: string;
  nowSec: number;
}

/** The same stations as on the map, for the keyboard and for those who do not see the map. */
export function StationList({ slug, stations, periodQuery, choice, zone, nowSec }: StationListProps) {
  return (
    <ul className="border-t border-line text-table">
      {stations.map((station) => (
        // What is out of sight need not be laid out.
        <li
          key={station.code}
          className="border-b border-line [contain-intrinsic-size:auto_3.4rem] [content-visibility:auto]"
        >
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
              {stateLine(station, zone, nowSec)}
              {station.overLimit && <span className="text-rust"> · over a limit</span>}
            </span>
          </button>
          {station.exceedances ? (
            <a
              className="mb-1.5 ml-[1.6rem] inline-block text-small"
              href={exceedancesHref(slug, station.code, periodQuery)}
            >
              {exceedanceWords(station)}
            </a>
          ) : null}
        </li>
      ))}
    </ul>
  );
}

function exceedancesHref(slug: string, code: string, periodQuery: string): string {
  const station = `station=${encodeURIComponent(code)}`;
  return `/n/${slug}/exceedances${periodQuery === '' ? '?' : `${periodQuery}&`}${station}`;
}

function CurrentLevel({ station }: { station: ShownStation }) {
  if (station.state !== 'live' || !station.latest) return <span className="text-ink-soft">—</span>;
  return (
    <span className="tabular-nums">
      {formatLevelDb(station.latest.LAeq)} <span className="text-ink-soft">dB, {averagingOf(station)}</span>
    </span>
  );
}
