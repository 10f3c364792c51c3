import { appendAudit } from '#db/queries/audit';
import { insertComplaintKey, writeComplaintPrivate } from '#db/queries/complaintPrivate';
import { insertComplaint } from '#db/queries/complaints';
import { inTransaction, type Connection } from '#db/queries/connection';
import type { NetworkRow, NetworkSettings } from '#db/queries/networks';
import { listStations, type StationRow } from '#db/queries/stations';
import type { ComplaintEffect, NewComplaint, PersonalData } from '#lib/contracts/complaints';
import { localDateAt } from '#lib/time/zone';
import { addWorkingDays, WORKING_DAYS_TO_ANSWER } from './dueDate';
import { newWrappedKey, sealValue } from './personalData';
import { filledFields } from './personalFields';
import { newReference } from './reference';
import { coarsePlace, distanceM, type Place } from './whereabouts';

/** A window may end this far ahead of our clock: the caller's may be a little fast. */
const CLOCK_TOLERANCE_SEC = 300;

export interface LoggingPerson {
  /** Null: the resident on the public form. */
  userId: string | null;
  network: NetworkRow;
  settings: NetworkSettings;
}

/** What comes with a complaint that a resident reports. */
export interface ResidentPart {
  effects: ComplaintEffect[];
  /** Writes what is kept beside the complaint, in its transaction. */
  writeBeside(complaintId: number, wrappedKey: Buffer, transaction: Connection): Promise<void>;
}

export type LogOutcome =
  { kind: 'logged'; reference: string } | { kind: 'invalid'; field: 'to' | 'station'; message: string };

/**
 * Logs a complaint: what everybody may read in the open, contact, own words and exact place sealed under a key of its
 * own. The nearest station is the named one, or of those not retired the nearest to the place.
 */
export async function logComplaint(
  { userId, network, settings }: LoggingPerson,
  complaint: NewComplaint,
  now: Date,
  resident: ResidentPart | null = null,
): Promise<LogOutcome> {
  const nowSec = Math.floor(now.getTime() / 1000);
  if (complaint.to > nowSec + CLOCK_TOLERANCE_SEC) {
    return {
      kind: 'invalid',
      field: 'to',
      message: 'must not lie in the future; what goes on still ends now',
    };
  }
  const stations = await listStations(network.id);
  const place = placeOf(complaint);
  const nearest = nearestStation(stations, complaint.station, place);
  if (complaint.station !== null && !nearest) {
    return { kind: 'invalid', field: 'station', message: 'must be a station of this network' };
  }
  const person: PersonalData = {
    contact: complaint.contact,
    words: complaint.words,
    place,
    ...(resident ? { effects: resident.effects } : {}),
  };
  const today = localDateAt(nowSec, settings.timeZone);
  const coarse = place && coarsePlace(place);

  const reference = await inTransaction(async (transaction) => {
    const made = await newReference(network.slug, Number(today.slice(0, 4)), transaction);
    const id = await insertComplaint(
      {
        networkId: network.id,
        reference: made,
        startsAtSec: complaint.from,
        endsAtSec: complaint.to,
        kind: complaint.kind,
        coarseLatitude: coarse?.latitude ?? null,
        coarseLongitude: coarse?.longitude ?? null,
        nearestStationId: nearest?.id ?? null,
        source: resident ? 'resident' : 'desk',
        dueOn: addWorkingDays(today, WORKING_DAYS_TO_ANSWER),
        createdBy: userId,
      },
      transaction,
    );
    const wrappedKey = newWrappedKey(id);
    await insertComplaintKey(id, wrappedKey, transaction);
    await writeComplaintPrivate(id, sealValue(wrappedKey, id, 'person', person), transaction);
    await resident?.writeBeside(id, wrappedKey, transaction);
    await appendAudit(
      {
        userId,
        networkId: network.id,
        action: resident ? 'complaint.report' : 'complaint.log',
        subject: `complaint ${made}`,
        detail: {
          kind: complaint.kind,
          from: complaint.from,
          to: complaint.to,
          personal: filledFields(person),
        },
      },
      transaction,
    );
    return made;
  });
  return { kind: 'logged', reference };
}

function placeOf({ latitude, longitude }: NewComplaint): Place | null {
  return latitude === null || longitude === null ? null : { latitude, longitude };
}

function nearestStation(
  stations: StationRow[],
  code: string | null,
  place: Place | null,
): StationRow | undefined {
  if (code !== null) return stations.find((station) => station.code === code);
  if (!place) return undefined;
  const standing = stations.filter((station) => station.retiredAt === null);
  return standing.toSorted((a, b) => distanceM(place, a) - distanceM(place, b))[0];
}
