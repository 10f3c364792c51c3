import { appendAudit } from '#db/queries/audit';
import { selectStandingShifts } from '#db/queries/clockShifts';
import { inTransaction, type Connection } from '#db/queries/connection';
import { findImport, lockImport, updateImport, type ImportRow, type ImportState } from '#db/queries/imports';
import { firstStartOfImport } from '#db/queries/retention';
import { hasShiftedOfImport } from '#db/queries/shiftedStarts';
import { type Import, type ImportAct, type ImportMapping } from '#lib/contracts/imports';
import { requireUnsealed } from '../retention/seal';
import { importJson } from './importJson';
import { EMPTY_REPORT } from './report';

export type ActOutcome =
  { kind: 'done'; import: Import } | { kind: 'unknown' } | { kind: 'not-now'; message: string };

interface Asked {
  networkId: number;
  id: number;
  userId: string;
}

interface Act {
  action: string;
  from: readonly ImportState[];
  changes: Parameters<typeof updateImport>[1];
  /** Said when the import is in another state. */
  otherwise: string;
}

const ACTS: Record<ImportAct, Act> = {
  store: {
    action: 'import.store',
    from: ['checked'],
    changes: { state: 'storing', startDone: 0 },
    otherwise: 'Only an import whose check is done can be stored.',
  },
  undo: {
    action: 'import.undo',
    from: ['stored'],
    changes: { state: 'undoing', startDone: 0 },
    otherwise: 'Only an import that is stored can be undone.',
  },
  redo: {
    action: 'import.redo',
    from: ['undone'],
    changes: { state: 'redoing', startDone: 0 },
    otherwise: 'Only an import that was undone can be redone.',
  },
  discard: {
    action: 'import.discard',
    from: ['mapping', 'checking', 'checked', 'failed', 'undone'],
    changes: { state: 'discarding' },
    otherwise: 'What an import has stored must be undone before its file can be discarded.',
  },
};

/** Asks the worker to store, undo, redo or discard an import. */
export function actOnImport(asked: Asked & { act: ImportAct; reason: string | null }): Promise<ActOutcome> {
  const { act, reason } = asked;
  return change(asked, {
    ...ACTS[act],
    changes: { ...ACTS[act].changes, problem: null, actReason: reason, finishedAt: null },
  });
}

/** Says what the columns of an import's file are, and has it checked from its beginning. */
export function mapImport(asked: Asked & { mapping: ImportMapping }): Promise<ActOutcome> {
  return change(asked, {
    action: 'import.map',
    from: ['mapping', 'checked', 'failed'],
    changes: {
      state: 'checking',
      problem: null,
      mapping: JSON.stringify(asked.mapping),
      bytesDone: 0,
      linesDone: 0,
      report: EMPTY_REPORT,
    },
    otherwise: 'The columns can be said anew only before the import is stored, and not while it is checked.',
  });
}

async function change({ networkId, id, userId }: Asked, act: Act): Promise<ActOutcome> {
  if (!(await findImport(networkId, id))) return { kind: 'unknown' };
  return inTransaction<ActOutcome>(async (transaction) => {
    const row: ImportRow = await lockImport(id, transaction);
    if (!act.from.includes(row.state)) return { kind: 'not-now', message: act.otherwise };
    await requireUnsealedRows(row, act, transaction);
    const hindrance = await clockHindrance(row, act, transaction);
    if (hindrance !== null) return { kind: 'not-now', message: hindrance };
    const changes = { ...act.changes, actedBy: userId, actedAt: new Date() };
    await updateImport(id, changes, transaction);
    await appendAudit(
      {
        userId,
        networkId,
        action: act.action,
        subject: `station ${row.stationCode}`,
        detail: { import: id, file: row.fileName, reason: act.changes.actReason ?? null },
      },
      transaction,
    );
    return { kind: 'done', import: importJson(await lockImport(id, transaction)) };
  });
}

/** @throws {SealedError} where intervals that would be taken out, or brought back, are of sealed time. */
async function requireUnsealedRows(
  { id, stationId }: ImportRow,
  { changes: { state } }: Act,
  transaction: Connection,
): Promise<void> {
  if (state !== 'undoing' && state !== 'redoing') return;
  const firstSec = await firstStartOfImport(stationId, id, transaction);
  if (firstSec !== null) await requireUnsealed(stationId, firstSec, transaction);
}

/** Why a shift of the station's clock forbids to store or take out intervals now; null when none does. */
async function clockHindrance(
  { id, stationId }: ImportRow,
  { changes: { state } }: Act,
  transaction: Connection,
): Promise<string | null> {
  if (state !== 'storing' && state !== 'undoing' && state !== 'redoing') return null;
  const shifts = await selectStandingShifts(stationId, transaction);
  if (shifts.some((shift) => shift.state !== 'moved')) {
    return 'Intervals of this station are being moved, because its clock was wrong. Wait until that is done.';
  }
  if (state !== 'undoing' || !(await hasShiftedOfImport(stationId, id, transaction))) return null;
  return 'A shift of the station’s clock has moved intervals of this import. Reverse that shift first.';
}
