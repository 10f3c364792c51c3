import { createHash } from 'node:crypto';
import type { ComplaintRow } from '#db/queries/complaints';
import { listSettings, pickSettings, type NetworkRow } from '#db/queries/networks';
import { listStations, type StationRow } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import type { Evidence } from '#lib/contracts/complaintEvidence';
import type { Whereabouts } from './letter/measured';
import { gatherStationEvidence } from './stationEvidence';
import { bearingDeg, distanceM, windTowards, type Place } from './whereabouts';

/** Stations that are shown to a reader who may know the exact place. */
const STATIONS_NEARBY = 3;

export interface EvidenceQuery {
  network: NetworkRow;
  complaint: ComplaintRow;
  /** The exact place; null where it is unknown, erased or not the reader's to see: then the nearest station stands alone. */
  place: Place | null;
  nowSec: number;
}

export interface GatheredEvidence {
  evidence: Evidence;
  /** Stations seen from the place, by code. Apart from the evidence, because distances would tell the place. */
  whereabouts: Record<string, Whereabouts>;
}

/**
 * The figures of a complaint's very window: the nearest station first, then its neighbours by code (their order by distance
 * would tell the place, and the evidence is kept in the open with a reply).
 */
export async function gatherEvidence(query: EvidenceQuery): Promise<GatheredEvidence> {
  const { network, complaint, place, nowSec } = query;
  const window = { fromSec: complaint.startsAtSec, toSec: complaint.endsAtSec };
  const timeline = await listSettings(network.id);
  const { timeZone, minimumCoverage } = pickSettings(timeline, window.fromSec);
  const stations = stationsFor(await listStations(network.id), complaint, place);
  const found = await Promise.all(
    stations.map((station) => gatherStationEvidence({ station, window, timeline, nowSec })),
  );
  const figures = {
    from: formatInstantUtc(window.fromSec),
    to: formatInstantUtc(window.toSec),
    timeZone,
    minimumCoverage,
    stations: found,
  };
  const digest = createHash('sha256').update(JSON.stringify(figures)).digest('hex');
  return { evidence: { ...figures, digest }, whereabouts: place ? whereaboutsOf(stations, place) : {} };
}

function stationsFor(stations: StationRow[], complaint: ComplaintRow, place: Place | null): StationRow[] {
  const nearest = stations.filter((station) => station.id === complaint.nearestStationId);
  if (!place) return nearest;
  const neighbours = stations
    .filter((station) => stoodThen(station, complaint) && station.id !== complaint.nearestStationId)
    .toSorted((a, b) => distanceM(place, a) - distanceM(place, b))
    .slice(0, STATIONS_NEARBY - nearest.length)
    .toSorted((a, b) => (a.code < b.code ? -1 : 1));
  return [...nearest, ...neighbours];
}

/** A station that retired since still tells of its time, so that the same question has the same answer later. */
function stoodThen({ retiredAt }: StationRow, { startsAtSec }: ComplaintRow): boolean {
  return retiredAt === null || retiredAt.getTime() / 1000 > startsAtSec;
}

function whereaboutsOf(stations: StationRow[], place: Place): Record<string, Whereabouts> {
  return Object.fromEntries(
    stations.map((station) => [
      station.code,
      {
        distanceM: Math.round(distanceM(place, station)),
        wind: windTowards(place, station),
        bearingDeg: Math.round(bearingDeg(place, station)) % 360,
      },
    ]),
  );
}
