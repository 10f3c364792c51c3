import { type Connection } from './connection';
import { insertQuarantinedOfImport, type NewQuarantined } from './quarantine';

/** Keeps refused records of an import until it is stored. */
export async function insertImportRefusals(
  importId: number,
  records: readonly NewQuarantined[],
  transaction: Connection,
): Promise<void> {
  for (let first = 0; first < records.length; first += 100) {
    await transaction('import_refusals').insert(
      records.slice(first, first + 100).map(({ code, detail, record, startSec }) => ({
        import_id: importId,
        code,
        detail: detail.slice(0, 500),
        record,
        starts_at: startSec,
      })),
    );
  }
}

/** Moves some refused records of an import into the quarantine of its station. @returns how many. */
export async function quarantineImportRefusals(
  { importId, stationId }: { importId: number; stationId: number },
  limit: number,
  now: Date,
  transaction: Connection,
): Promise<number> {
  const rows: (NewQuarantined & { id: number })[] = await transaction('import_refusals')
    .where({ import_id: importId })
    .orderBy('id')
    .limit(limit)
    .select({ id: 'id', code: 'code', detail: 'detail', record: 'record', startSec: 'starts_at' });
  await insertQuarantinedOfImport(importId, stationId, rows, now, transaction);
  await deleteIds(
    'import_refusals',
    rows.map(({ id }) => id),
    transaction,
  );
  return rows.length;
}

/** Takes records that an import brought and nobody has settled back out of quarantine. @returns how many. */
export async function unquarantineOfImport(
  importId: number,
  limit: number,
  transaction: Connection,
): Promise<number> {
  const rows: (NewQuarantined & { id: number })[] = await transaction('quarantine')
    .where({ import_id: importId })
    .whereNull('settled_at')
    .orderBy('id')
    .limit(limit)
    .forUpdate()
    .select({ id: 'id', code: 'code', detail: 'detail', record: 'record', startSec: 'starts_at' });
  await insertImportRefusals(importId, rows, transaction);
  await deleteIds(
    'quarantine',
    rows.map(({ id }) => id),
    transaction,
  );
  return rows.length;
}

/** Forgets refused records of an import. @returns how many. */
export async function deleteImportRefusals(
  importId: number,
  limit: number,
  transaction: Connection,
): Promise<number> {
  return transaction('import_refusals').where({ import_id: importId }).limit(limit).delete();
}

async function deleteIds(table: string, ids: readonly number[], transaction: Connection): Promise<void> {
  if (ids.length > 0) await transaction(table).whereIn('id', ids).delete();
}
