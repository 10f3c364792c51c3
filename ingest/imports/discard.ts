import type { Knex } from 'knex';
import { inTransaction } from '#db/queries/connection';
import { deleteStaged } from '#db/queries/importIntervals';
import { deleteImportRefusals } from '#db/queries/importRefusals';
import { lockImport, updateImport, type ImportRow } from '#db/queries/imports';
import { removeFile } from './files';

const ROWS_A_PART = 5000;

/** Forgets everything that the check of an import has put aside, as long as `mayForget` says so of the import as it then is. */
export async function clearStaged(importId: number, mayForget: (row: ImportRow) => boolean): Promise<void> {
  const partOf = (forget: (transaction: Knex.Transaction) => Promise<number>) => () =>
    inTransaction(async (transaction) =>
      mayForget(await lockImport(importId, transaction)) ? forget(transaction) : 0,
    );
  for (const part of [
    partOf((transaction) => deleteStaged(importId, null, ROWS_A_PART, transaction)),
    partOf((transaction) => deleteImportRefusals(importId, ROWS_A_PART, transaction)),
  ]) {
    while ((await part()) === ROWS_A_PART);
  }
}

/** Forgets an import's rows and its file; the import itself stays in the list. */
export async function discardImport({ id, fileKey }: ImportRow): Promise<number> {
  await clearStaged(id, ({ state }) => state === 'discarding');
  await removeFile(fileKey);
  await inTransaction(async (transaction) => {
    const row = await lockImport(id, transaction);
    if (row.state !== 'discarding') return;
    await updateImport(id, { state: 'discarded', finishedAt: new Date() }, transaction);
  });
  return 1;
}
