import { markMerged, statusBeforeMerge, unmarkMerged } from '#db/queries/complaintDesk';
import { findSealedPerson } from '#db/queries/complaintPrivate';
import { findComplaint, listMergedInto } from '#db/queries/complaints';
import { actOnComplaint, type DeskAct, type DeskOutcome } from './deskAct';

/**
 * Merges a complaint into the one that it repeats: it is closed as a repeat, keeps its own window and data, and is answered with the
 * other one. What it was is remembered, so that the merge can be undone.
 */
export function mergeCase(act: DeskAct, intoReference: string): Promise<DeskOutcome> {
  return actOnComplaint(act, async (complaint, transaction) => {
    const into = await findComplaint(act.network.id, intoReference.trim().toUpperCase(), transaction);
    if (!into) return `This network has no complaint ${intoReference.trim()}. Nothing was merged.`;
    if (into.id === complaint.id) return 'A complaint cannot repeat itself. Nothing was merged.';
    if (into.mergedInto !== null) {
      return `${into.reference} is itself merged into ${into.mergedInto}: merge into that one.`;
    }
    if (complaint.mergedInto !== null) return `It is merged into ${complaint.mergedInto} already.`;
    if ((await listMergedInto(complaint.id, transaction)).length > 0) {
      return 'Others are merged into this one: undo that first, or merge the other one into this one.';
    }
    const { id, status } = complaint;
    await markMerged({ id, into: into.id, status }, new Date(), transaction);
    return { action: 'complaint.merge', detail: { into: into.reference, status } };
  });
}

/** Undoes a merge: the complaint is again what it was. */
export function unmergeCase(act: DeskAct): Promise<DeskOutcome> {
  return actOnComplaint(act, async (complaint, transaction) => {
    const status = await statusBeforeMerge(complaint.id, transaction);
    if (status === null) return 'It is not merged. Nothing was changed.';
    if (status === 'open' && !(await findSealedPerson(complaint.id, transaction))) {
      return 'The personal data have been erased since: there is nobody to answer. It stays merged.';
    }
    await unmarkMerged(complaint.id, status, transaction);
    return { action: 'complaint.unmerge', detail: { from: complaint.mergedInto, status } };
  });
}
