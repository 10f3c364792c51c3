import { inTransaction } from '#db/queries/connection';
import { deleteStaged } from '#db/queries/importIntervals';
import { deleteImportRefusals } from '#db/queries/importRefusals';
import { lockImport, updateImport, type ImportRow } from '#db/queries/imports';
import { removeFile } from './files';

const ROWS_A_PART = 5000;

/** Forgets everything that the check of an import has put aside. */
export async function clearStaged(importId: number): Promise<void> {
  for (const part of [
    (id: number) => inTransaction((transaction) => deleteStaged(id, null, ROWS_A_PART, transaction)),
    (id: number) => inTransaction((transaction) => deleteImportRefusals(id, ROWS_A_PART, transaction)),
  ]) {
    while ((await part(importId)) === ROWS_A_PART);
  }
}

/** Forgets an import's rows and its file; the import itself stays in the list. */
export async function discardImport({ id, fileKey }: ImportRow): Promise<number> {
  await clearStaged(id);
  await removeFile(fileKey);
  await inTransaction(async (transaction) => {
    const row = await lockImport(id, transaction);
    if (row.state !== 'discarding') return;
    await updateImport(id, { state: 'discarded', finishedAt: new Date() }, transaction);
  });
  return 1;
}
