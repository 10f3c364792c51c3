import { formatInstantUtc } from '#lib/contracts/instants';
import { TILE_COLUMNS, type Tile } from './tiles';

/** What columns are asked for with. */
export const COLUMNS_HEADERS = { Accept: 'application/octet-stream' };

/** Address of a tile's columns, as many as a tile of the strip has unless told otherwise. */
export function columnsUrl(stationUrl: string, tile: Tile, columns = TILE_COLUMNS): string {
  const query = new URLSearchParams({
    from: formatInstantUtc(tile.fromSec),
    to: formatInstantUtc(tile.toSec),
    columns: String(columns),
    percentiles: 'A',
  });
  return `${stationUrl}/spectrogram?${query.toString()}`;
}
