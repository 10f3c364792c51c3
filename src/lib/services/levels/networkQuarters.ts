import { pool, type Connection } from '#db/queries/connection';
import { selectDirtyStations, selectQuarterLevels, type QuarterLevel } from '#db/queries/networkQuarters';
import { listSettings, type NetworkSettings } from '#db/queries/networks';
import { listStations, type StationRow } from '#db/queries/stations';
import { QUARTER_SEC } from '#lib/time/quarters';
import { currentQuarters } from './currentQuarters';
import { meanCentiDb } from './intervalColumns';
import { type Span } from './spans';

/** A station's quarter-hours of a span, one after the other. */
export interface StationQuarters {
  station: StationRow;
  /** Hundredths of a dB; `NO_LEVEL_CENTI_DB` where nothing counts. */
  laeqCentiDb: number[];
  validSec: number[];
}

/**
 * LAeq of every quarter-hour of a span (whole quarter-hours) for every station of a network, by code; those that wait for
 * recomputation are made from their intervals.
 */
export async function networkQuarters(
  networkId: number,
  span: Span,
  conn: Connection = pool(),
): Promise<StationQuarters[]> {
  const [stations, timeline] = [await listStations(networkId, conn), await listSettings(networkId, conn)];
  const ids = stations.map(({ id }) => id);
  // Marks before rows: a mark that goes meanwhile has left its row.
  const dirty = await selectDirtyStations(ids, span.fromSec, span.toSec, conn);
  const rows = await selectQuarterLevels(
    ids.filter((id) => !dirty.has(id)),
    span.fromSec,
    span.toSec,
    conn,
  );
  for (const station of stations.filter(({ id }) => dirty.has(id))) {
    rows.push(...(await levelsOfWaiting(station, timeline, span, conn)));
  }
  return arranged(stations, rows, span);
}

async function levelsOfWaiting(
  station: StationRow,
  timeline: NetworkSettings[],
  span: Span,
  conn: Connection,
): Promise<QuarterLevel[]> {
  const source = { station, timeline, validity: 'rules' } as const;
  const quarters = await currentQuarters(source, span, { bands: false }, conn);
  return quarters.map(({ startSec, sums: { validSec, aEnergySec } }) => ({
    stationId: station.id,
    startSec,
    validSec,
    aEnergySec,
  }));
}

function arranged(stations: StationRow[], rows: readonly QuarterLevel[], span: Span): StationQuarters[] {
  const count = (span.toSec - span.fromSec) / QUARTER_SEC;
  const byStation = new Map(
    stations.map((station) => [
      station.id,
      {
        station,
        laeqCentiDb: Array.from({ length: count }, () => meanCentiDb(0, 0)),
        validSec: Array.from({ length: count }, () => 0),
      },
    ]),
  );
  for (const { stationId, startSec, validSec, aEnergySec } of rows) {
    const held = byStation.get(stationId);
    const at = (startSec - span.fromSec) / QUARTER_SEC;
    if (!held) continue;
    held.laeqCentiDb[at] = meanCentiDb(aEnergySec, validSec);
    held.validSec[at] = validSec;
  }
  return [...byStation.values()];
}
