import { listComplaintsAround } from '#db/queries/complaintsAround';
import type { ComplaintRow } from '#db/queries/complaints';
import type { OtherReports } from '#lib/contracts/evidencePack';
import { distanceM, type Place } from '../whereabouts';

const WITHIN_HOURS = 12;
const WITHIN_KM = 2;

/**
 * How many other reports came from nearby around that time: counts alone. Places are compared as they stand in the open, to
 * 0.01 degree; where one of the two has none, the same nearest station counts as near.
 */
export async function otherReports(complaint: ComplaintRow): Promise<OtherReports> {
  const around = await listComplaintsAround(complaint.networkId, {
    fromSec: complaint.startsAtSec - WITHIN_HOURS * 3600,
    toSec: complaint.endsAtSec + WITHIN_HOURS * 3600,
  });
  const near = around.filter((other) => other.id !== complaint.id && isNear(complaint, other));
  return {
    withinHours: WITHIN_HOURS,
    withinKm: WITHIN_KM,
    count: near.length,
    sameKind: near.filter(({ kind }) => kind === complaint.kind).length,
  };
}

type Placed = Pick<ComplaintRow, 'coarseLatitude' | 'coarseLongitude' | 'nearestStationId'>;

function isNear(one: Placed, other: Placed): boolean {
  const [a, b] = [placeOf(one), placeOf(other)];
  if (a && b) return distanceM(a, b) <= WITHIN_KM * 1000;
  return one.nearestStationId !== null && one.nearestStationId === other.nearestStationId;
}

function placeOf({ coarseLatitude: latitude, coarseLongitude: longitude }: Placed): Place | null {
  return latitude === null || longitude === null ? null : { latitude, longitude };
}
