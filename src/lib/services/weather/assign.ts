import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import {
  endAssignment,
  findAssignment,
  insertAssignment,
  selectAssignmentsOf,
} from '#db/queries/mastAssignments';
import { findMast, lockMast } from '#db/queries/masts';
import { findStation, lockStation } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Assignment, type NewAssignment } from '#lib/contracts/weather';
import { markTouched } from '../exclusions/touched';
import { done, invalid, unknown, type Outcome } from '../outcome';
import { assignmentJson } from './mastJson';
import { NO_MAST } from './masts';

const NO_ASSIGNMENT = unknown('The network has no assignment with this number.');

interface Actor {
  networkId: number;
  userId: string;
}

/** Lets a mast tell the weather of a station for a time; a station has one mast at a time. Figures of that time follow. */
export function assignMast(
  { networkId, userId }: Actor,
  mastCode: string,
  { station: stationCode, from, to }: NewAssignment,
): Promise<Outcome<Assignment>> {
  return inTransaction<Outcome<Assignment>>(
    async (transaction) => {
      const mast = await findMast(networkId, mastCode, transaction);
      if (!mast) return NO_MAST;
      const station = await findStation(networkId, stationCode, transaction);
      if (!station) return invalid('station', 'is not a station of the network');
      await lockMast(mast.id, transaction);
      await lockStation(station.id, transaction);
      const span = { fromSec: from, toSec: to ?? null };
      const [other] = await selectAssignmentsOf(station.id, span, transaction);
      if (other) {
        const until = other.toSec === null ? 'further notice' : formatInstantUtc(other.toSec);
        const when = `from ${formatInstantUtc(other.fromSec)} until ${until}`;
        return invalid('from', `overlaps the assignment of ${other.mastCode} ${when}: end that one first`);
      }
      const id = await insertAssignment(
        { networkId, stationId: station.id, mastId: mast.id, ...span, createdBy: userId },
        transaction,
      );
      await markAssigned(station.id, from, to ?? null, transaction);
      const detail = { assignment: id, station: station.code, ...toldSpan(span) };
      await appendAudit(
        { userId, networkId, action: 'mast.assign', subject: `mast ${mast.code}`, detail },
        transaction,
      );
      return read(networkId, id, transaction);
    },
    { isolationLevel: 'read committed' },
  );
}

/** Ends an assignment earlier than it would; what the mast decided after that end is computed anew without it. */
export function endMastAssignment(
  { networkId, userId }: Actor,
  id: number,
  toSec: number,
): Promise<Outcome<Assignment>> {
  return inTransaction<Outcome<Assignment>>(
    async (transaction) => {
      const found = await findAssignment(networkId, id, transaction);
      if (!found) return NO_ASSIGNMENT;
      await lockMast(found.mastId, transaction);
      await lockStation(found.stationId, transaction);
      const now = (await findAssignment(networkId, id, transaction)) ?? found;
      if (toSec <= now.fromSec) return invalid('to', `must be after ${formatInstantUtc(now.fromSec)}`);
      if (now.toSec !== null && toSec >= now.toSec)
        return invalid('to', `must be before ${formatInstantUtc(now.toSec)}, when it ends already`);
      await endAssignment(id, { toSec, by: userId }, transaction);
      await markAssigned(now.stationId, toSec, now.toSec, transaction);
      const detail = { assignment: id, station: now.stationCode, to: formatInstantUtc(toSec) };
      await appendAudit(
        { userId, networkId, action: 'mast.unassign', subject: `mast ${now.mastCode}`, detail },
        transaction,
      );
      return read(networkId, id, transaction);
    },
    { isolationLevel: 'read committed' },
  );
}

/** Nothing that is measured lies further ahead than the clocks that are believed. */
async function markAssigned(
  stationId: number,
  fromSec: number,
  toSec: number | null,
  transaction: Connection,
): Promise<void> {
  const endSec = Math.min(toSec ?? Infinity, Math.ceil(Date.now() / 1000) + 3600);
  if (fromSec < endSec) await markTouched(stationId, { fromSec, toSec: endSec }, transaction);
}

function toldSpan({ fromSec, toSec }: { fromSec: number; toSec: number | null }) {
  return { from: formatInstantUtc(fromSec), to: toSec === null ? null : formatInstantUtc(toSec) };
}

async function read(networkId: number, id: number, transaction: Connection): Promise<Outcome<Assignment>> {
  const row = await findAssignment(networkId, id, transaction);
  return row ? done(assignmentJson(row)) : NO_ASSIGNMENT;
}
