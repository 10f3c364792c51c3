import { earlyColumns, forgetEarlyColumns } from '../early/earlyColumns';
import { COLUMNS_HEADERS, columnsUrl } from '../model/columnsRequest';
import { decodeColumns } from '../model/decodeColumns';
import { type StripColumns } from '../model/stripColumns';
import { type Tile } from '../model/tiles';
import { fetchAnswer } from './fetchJson';

/** A tile's columns from the server: those that the page asked for early, once. @throws {ServerRefusal} */
export async function fetchColumns(
  stationUrl: string,
  tile: Tile,
  signal: AbortSignal,
  columns?: number,
): Promise<StripColumns> {
  const url = columnsUrl(stationUrl, tile, columns);
  const early = await earlyColumns(url);
  if (early) {
    forgetEarlyColumns(url);
    return early;
  }
  const answer = await fetchAnswer(url, { signal, headers: COLUMNS_HEADERS });
  return decodeColumns(await answer.arrayBuffer());
}
