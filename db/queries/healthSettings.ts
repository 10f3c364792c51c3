import { pool, type Connection } from './connection';

/** Bounds that differ from what holds otherwise, of a network (station 0) or of a station. */
export interface HealthSettingsRow {
  stationId: number;
  thresholds: Record<string, number>;
  recipients: string[];
}

export async function listHealthSettings(
  networkId: number,
  conn: Connection = pool(),
): Promise<HealthSettingsRow[]> {
  const rows: { stationId: number; thresholds: unknown; recipients: unknown }[] = await conn(
    'health_settings',
  )
    .where({ network_id: networkId })
    .select({ stationId: 'station_id', thresholds: 'thresholds', recipients: 'recipients' });
  return rows.map((row) => ({
    stationId: row.stationId,
    thresholds: parsed(row.thresholds) as Record<string, number>,
    recipients: parsed(row.recipients) as string[],
  }));
}

export async function setHealthSettings(
  networkId: number,
  { stationId, thresholds, recipients }: HealthSettingsRow,
  changedBy: string,
  conn: Connection,
): Promise<void> {
  const row = {
    network_id: networkId,
    station_id: stationId,
    thresholds: JSON.stringify(thresholds),
    recipients: JSON.stringify(recipients),
    changed_by: changedBy,
    changed_at: new Date(),
  };
  await conn('health_settings').insert(row).onConflict(['network_id', 'station_id']).merge();
}

const parsed = (cell: unknown): unknown => (typeof cell === 'string' ? JSON.parse(cell) : cell);
