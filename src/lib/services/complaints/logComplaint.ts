import { appendAudit } from '#db/queries/audit';
import { writeContactDigests } from '#db/queries/complaintContacts';
import { insertComplaintKey, writeComplaintPrivate } from '#db/queries/complaintPrivate';
import { insertComplaint } from '#db/queries/complaints';
import { inTransaction, type Connection } from '#db/queries/connection';
import type { NetworkRow, NetworkSettings } from '#db/queries/networks';
import { listStations, type StationRow } from '#db/queries/stations';
import type { ComplaintEffect, NewComplaint, PersonalData } from '#lib/contracts/complaints';
import type { ReportArea } from '#lib/contracts/reports';
import { localDateAt } from '#lib/time/zone';
import { areasInUse } from '../reports/areas';
import { contactDigests } from './desk/contactDigests';
import { answerDueOn } from './dueDate';
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
  | { kind: 'logged'; reference: string }
  | { kind: 'invalid'; field: 'to' | 'station' | 'area'; message: string };

/**
 * Logs a complaint: what everybody may read in the open, contact, own words and exact place sealed under a key of its
 * own. The nearest station is the named one, or of those not retired the nearest to the place, or the one of the area.
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
  const area = complaint.area === null ? null : await findArea(network.id, complaint.area);
  if (area === undefined) {
    return { kind: 'invalid', field: 'area', message: 'must be an area of this network' };
  }
  const code = complaint.station ?? (place ? null : (area?.station ?? null));
  const nearest = nearestStation(stations, code, place);
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
        area: area?.name ?? null,
        source: resident ? 'resident' : 'desk',
        dueOn: await answerDueOn(network.id, today, transaction),
        createdBy: userId,
      },
      transaction,
    );
    const wrappedKey = newWrappedKey(id);
    await insertComplaintKey(id, wrappedKey, transaction);
    await writeComplaintPrivate(id, sealValue(wrappedKey, id, 'person', person), transaction);
    const digests = contactDigests(network.id, person.contact);
    await writeContactDigests({ id, networkId: network.id }, digests, transaction);
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

/** Undefined where the network has no area of that name. */
async function findArea(networkId: number, name: string): Promise<ReportArea | undefined> {
  return (await areasInUse(networkId)).find((area) => area.name === name);
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
