import { listWithdrawnNotes } from '#db/queries/complaintNotes';
import { findComplaint } from '#db/queries/complaints';
import type { NetworkRow } from '#db/queries/networks';
import { formatInstantUtc } from '#lib/contracts/common';
import type { Assignment, DeskNotes } from '#lib/contracts/complaintDeskRoutes';
import { answerersOf } from './assign';
import type { DeskAct } from './deskAct';
import { readNotes } from './notes';

/** Who answers a complaint, and who could; null: there is no such complaint. */
export async function assignmentOf(network: NetworkRow, reference: string): Promise<Assignment | null> {
  const row = await findComplaint(network.id, reference);
  if (!row) return null;
  const { assignedTo: id, assignedToName: name } = row;
  return {
    assignedTo: id === null || name === null ? null : { id, name },
    people: await answerersOf(network.id),
  };
}

/** Internal notes of a complaint, an audited look; null: there is no such complaint. @throws {PersonalDataUnreadable} */
export async function notesOf({ userId, network, reference }: DeskAct): Promise<DeskNotes | null> {
  const row = await findComplaint(network.id, reference);
  if (!row) return null;
  const notes = await readNotes(userId, row);
  return {
    items: notes.map(({ at, ...note }) => ({
      ...note,
      at: formatInstantUtc(Math.floor(at.getTime() / 1000)),
    })),
    withdrawn: await listWithdrawnNotes(row.id),
  };
}

/** What a complaint repeats; null: nothing. */
export async function mergedIntoOf(network: NetworkRow, reference: string): Promise<string | null> {
  return (await findComplaint(network.id, reference))?.mergedInto ?? null;
}
