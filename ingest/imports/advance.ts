import { inTransaction } from '#db/queries/connection';
import { findWorkingImport, lockImport, updateImport, type ImportRow } from '#db/queries/imports';
import { eachAlone, restingNumbers } from '../jobs/alone';
import { checkImport } from './check';
import { UnreadableFile } from './csvRows';
import { discardImport } from './discard';
import { redoImport } from './redo';
import { storeImport } from './storeStaged';
import { undoImport } from './undo';

const JOB = 'import-files';
const ROUND_MS = 5000;

/**
 * Does a bounded part of the oldest import that waits for something. Every part begins where the last committed chunk ended, so
 * it makes no difference whether the worker went on or began again. One that fails unforeseen rests, and the next goes on. @returns how much it did; 0 when nothing waits.
 */
export async function advanceImports(): Promise<number> {
  const now = new Date();
  const row = await findWorkingImport(await restingNumbers(JOB, 'import', now));
  if (!row) return 0;
  const subject = { name: `import ${row.id}`, networkId: row.networkId };
  return eachAlone(JOB, [row], () => subject, advanceOne, now);
}

async function advanceOne(row: ImportRow): Promise<number> {
  const endsAtMs = Date.now() + ROUND_MS;
  const isOver = () => Date.now() > endsAtMs;
  try {
    return await advance(row, isOver);
  } catch (error) {
    const problem = problemOf(error);
    if (problem === null) throw error;
    await fail(row, problem);
    return 1;
  }
}

function advance(row: ImportRow, isOver: () => boolean): Promise<number> {
  switch (row.state) {
    case 'checking':
      return checkImport(row, isOver);
    case 'storing':
      return storeImport(row, isOver);
    case 'undoing':
      return undoImport(row, isOver);
    case 'redoing':
      return redoImport(row, isOver);
    default:
      return discardImport(row);
  }
}

/** What is wrong with the file, in words; null for errors that may pass. */
function problemOf(error: unknown): string | null {
  if (error instanceof UnreadableFile) return `${error.message} Nothing of the file was stored.`;
  const isGone = (error as { code?: string }).code === 'ENOENT';
  return isGone ? 'The file is no longer there. Nothing of it was stored; upload it again.' : null;
}

async function fail({ id, state }: ImportRow, problem: string): Promise<void> {
  await inTransaction(async (transaction) => {
    const row = await lockImport(id, transaction);
    if (row.state !== state) return;
    await updateImport(id, { state: 'failed', problem, finishedAt: new Date() }, transaction);
  });
}
