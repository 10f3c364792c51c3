import type { SummaryTemplate } from '#lib/contracts/summaryTemplate';
import { pool, type Connection } from './connection';
import { jsonOf } from './json';

/** How a network’s months are drafted and printed, as somebody set it. */
export interface SummarySettingsRow {
  networkId: number;
  version: number;
  /** Days after a month’s end before it is drafted. */
  graceDays: number;
  template: SummaryTemplate;
  markSha256: Buffer | null;
  markMediaType: string | null;
  createdAt: Date;
  createdByName: string | null;
}

function select(conn: Connection) {
  return conn('summary_settings as s').leftJoin('users as u', 'u.id', 's.created_by').select({
    networkId: 's.network_id',
    version: 's.version',
    graceDays: 's.grace_days',
    template: 's.template',
    markSha256: 's.mark_sha256',
    markMediaType: 's.mark_media_type',
    createdAt: 's.created_at',
    createdByName: 'u.name',
  });
}

const rowOf = (row: SummarySettingsRow): SummarySettingsRow => ({
  ...row,
  template: jsonOf<SummaryTemplate>(row.template),
});

/** Every version of a network’s settings, latest first. */
export async function listSummarySettings(
  networkId: number,
  conn: Connection = pool(),
): Promise<SummarySettingsRow[]> {
  const rows: SummarySettingsRow[] = await select(conn)
    .where('s.network_id', networkId)
    .orderBy('s.version', 'desc');
  return rows.map(rowOf);
}

/** Adds a version. One that another person added meanwhile fails with MariaDB’s duplicate-key error. */
export async function insertSummarySettings(
  settings: Omit<SummarySettingsRow, 'createdAt' | 'createdByName'>,
  userId: string,
  conn: Connection,
): Promise<void> {
  await conn('summary_settings').insert({
    network_id: settings.networkId,
    version: settings.version,
    grace_days: settings.graceDays,
    template: JSON.stringify(settings.template),
    mark_sha256: settings.markSha256,
    mark_media_type: settings.markMediaType,
    created_by: userId,
    created_at: new Date(),
  });
}
