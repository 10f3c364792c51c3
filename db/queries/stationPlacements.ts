import type { Placement } from '#lib/acoustics/facade';
import { pool, type Connection } from './connection';
import { type StationRow } from './stations';

/** How a microphone has stood from an instant on, until the next of its station. */
export interface PlacementRow {
  /** Epoch seconds; 0: ever since. */
  effectiveFromSec: number;
  placement: Placement;
  /** Taken off a level measured at a façade, dB. */
  facadeCorrectionDb: number;
}

/** Placements of a station in order of their beginning; at least one, as a station that was never moved has stood as it does. */
export async function listPlacements(
  station: Pick<StationRow, 'id' | 'placement' | 'facadeCorrectionDb'>,
  conn: Connection = pool(),
): Promise<PlacementRow[]> {
  const rows: PlacementRow[] = await conn('station_placements')
    .where({ station_id: station.id })
    .orderBy('effective_from')
    .select({
      effectiveFromSec: 'effective_from',
      placement: 'placement',
      facadeCorrectionDb: 'facade_correction_db',
    });
  const { placement, facadeCorrectionDb } = station;
  return rows.length > 0 ? rows : [{ effectiveFromSec: 0, placement, facadeCorrectionDb }];
}

/** Adds a placement, or replaces the one that begins at that very instant. */
export async function insertPlacement(
  stationId: number,
  row: PlacementRow,
  createdBy: string,
  conn: Connection,
): Promise<void> {
  await conn('station_placements')
    .insert({
      station_id: stationId,
      effective_from: row.effectiveFromSec,
      placement: row.placement,
      facade_correction_db: row.facadeCorrectionDb,
      created_by: createdBy,
      created_at: new Date(),
    })
    .onConflict(['station_id', 'effective_from'])
    .merge();
}
