import { roundHalfUp } from '#lib/acoustics/rounding';
import { type StationColumnKey } from '#lib/contracts/stationList';
import { type Cell } from '#lib/format/csvText';
import { type StationListRow } from './listRow';

const shown = (levelDb: number | null) => (levelDb === null ? null : roundHalfUp(levelDb, 1));

/** A column's value of a station: levels in dB to 0.1 as shown, times in UTC, lengths in s; null where there is none. */
export function listCell({ station, figures, troubles }: StationListRow, column: StationColumnKey): Cell {
  const { latest } = station;
  switch (column) {
    case 'station':
      return station.name;
    case 'state':
      return station.state;
    case 'troubles':
      return troubles.join(' ');
    case 'newest':
      return latest && station.state === 'live' ? shown(latest.LAeq) : null;
    case 'laeq':
      return shown(figures.laeqDb);
    case 'lafmax':
      return shown(figures.lafmaxDb);
    case 'la90':
      return shown(figures.la90Db);
    case 'coverage':
      return Number(figures.coverage.toFixed(4));
    case 'lastPost':
      return latest?.receivedAt ?? null;
    case 'battery':
      return latest?.battery ?? null;
    case 'interval':
      return station.intervalSeconds;
    case 'bands':
      return `${station.bandFraction === 3 ? 'thirds' : 'octaves'} ${station.firstBandHz}–${station.lastBandHz} Hz`;
    case 'placement':
      return station.placement;
    case 'height':
      return station.mastHeight;
    case 'latitude':
      return station.latitude;
    case 'longitude':
      return station.longitude;
    case 'registered':
      return station.createdAt;
  }
}
