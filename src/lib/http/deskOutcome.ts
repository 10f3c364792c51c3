import type { DeskOutcome } from '#lib/services/complaints/desk/deskAct';
import { notFound, Problem } from './problem';

export const unknownComplaint = () => notFound('The network has no complaint with this reference.');

/** Lets an act of the desk that was done pass. @throws {Problem} 404, 409 where nothing was changed. */
export function requireDone<T extends DeskOutcome>(outcome: T): Extract<T, { kind: 'done' }> {
  if (outcome.kind === 'unknown') throw unknownComplaint();
  if (outcome.kind === 'refused') {
    throw new Problem(409, 'refused', 'Nothing was changed', outcome.message);
  }
  return outcome as Extract<T, { kind: 'done' }>;
}
