import { type TroubleKind } from '#lib/contracts/health';
import { type Station } from '#lib/contracts/stations';
import { type StationFigures } from './stationFigures';

/** A station of the list: how it is now, and what the list's period gave. */
export interface StationListRow {
  station: Station;
  /** Not over, as the worker found them last. */
  troubles: TroubleKind[];
  figures: StationFigures;
}
