import { pool, type Connection } from './connection';

/** How full the disk was. */
export interface DiskSample {
  takenAt: Date;
  totalBytes: number;
  /** That Bittern may still write. */
  freeBytes: number;
  /** Of all tables. */
  databaseBytes: number;
  /** Little room, by the forecast of then. */
  isLow: boolean;
}

/** Keeps how full the disk is; one of two at the same moment. */
export async function insertDiskSample(sample: DiskSample, conn: Connection = pool()): Promise<void> {
  await conn('disk_samples')
    .insert({
      taken_at: sample.takenAt,
      total_bytes: sample.totalBytes,
      free_bytes: sample.freeBytes,
      database_bytes: sample.databaseBytes,
      is_low: sample.isLow,
    })
    .onConflict(['taken_at'])
    .merge();
}

/** Samples since an instant, oldest first. */
export async function diskSamplesSince(since: Date, conn: Connection = pool()): Promise<DiskSample[]> {
  const rows: Record<string, unknown>[] = await conn('disk_samples')
    .where('taken_at', '>=', since)
    .orderBy('taken_at');
  return rows.map((row) => ({
    takenAt: row['taken_at'] as Date,
    totalBytes: Number(row['total_bytes']),
    freeBytes: Number(row['free_bytes']),
    databaseBytes: Number(row['database_bytes']),
    isLow: Boolean(row['is_low']),
  }));
}

/** Since when there has been little room without a break, as of the newest sample; null where there is enough. */
export async function lowSince(conn: Connection = pool()): Promise<Date | null> {
  const lastEnough = conn('disk_samples').where({ is_low: false }).max('taken_at');
  const row = await conn('disk_samples')
    .where({ is_low: true })
    .andWhere('taken_at', '>', conn.raw("COALESCE((?), '1000-01-01')", [lastEnough]))
    .min<{ since: Date | null }>({ since: 'taken_at' })
    .first();
  return row?.since ?? null;
}

export async function deleteDiskSamplesBefore(before: Date, conn: Connection = pool()): Promise<number> {
  return conn('disk_samples').where('taken_at', '<', before).delete();
}

/** Bytes of the tables of this database, as the server counts them. */
export async function databaseBytes(conn: Connection = pool()): Promise<number> {
  const [[row]] = (await conn.raw(
    `SELECT COALESCE(SUM(data_length + index_length + data_free), 0) AS bytes FROM information_schema.tables
     WHERE table_schema = DATABASE()`,
  )) as [{ bytes: number | string }[]];
  return Number(row?.bytes ?? 0);
}
