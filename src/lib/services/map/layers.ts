import { listComplaints, type ComplaintRow } from '#db/queries/complaints';
import { countExceedancesByStation } from '#db/queries/mapLayers';
import { listStations } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import { type MapLayers, type NetworkWind } from '#lib/contracts/networkMap';
import { type Span } from '#lib/services/levels/spans';
import { networkWind } from '#lib/services/weather/networkWind';

const MOST_COMPLAINTS = 500;

/** Exceedances and complaints of a period for a map. Of a complaint only the rounded place is told, whoever reads. */
export async function mapLayers(networkId: number, { fromSec, toSec }: Span): Promise<MapLayers> {
  const [stations, counts, complaints] = await Promise.all([
    listStations(networkId),
    countExceedancesByStation(networkId, fromSec, toSec),
    listComplaints(networkId, { fromSec, toSec, limit: MOST_COMPLAINTS + 1 }),
  ]);
  const given = complaints.slice(0, MOST_COMPLAINTS);
  return {
    from: formatInstantUtc(fromSec),
    to: formatInstantUtc(toSec),
    exceedances: stations.flatMap(({ id, code }) => {
      const count = counts.get(id);
      return count === undefined ? [] : [{ station: code, count }];
    }),
    complaints: {
      places: placesOf(given),
      withoutPlace: given.filter((one) => one.coarseLatitude === null).map(({ reference }) => reference),
      isComplete: complaints.length <= MOST_COMPLAINTS,
    },
  };
}

/** Wind of a network at an instant as the interface tells it. */
export async function windLayer(networkId: number, atSec: number): Promise<NetworkWind> {
  const winds = await networkWind(networkId, atSec);
  return {
    at: formatInstantUtc(atSec),
    items: winds.map(({ speedMs: speed, fromDeg: direction, ageSec: ageSeconds, ...place }) => ({
      ...place,
      speed,
      direction,
      ageSeconds,
    })),
  };
}

function placesOf(complaints: readonly ComplaintRow[]): MapLayers['complaints']['places'] {
  const places = new Map<string, MapLayers['complaints']['places'][number]>();
  for (const { coarseLatitude: latitude, coarseLongitude: longitude, reference } of complaints) {
    if (latitude === null || longitude === null) continue;
    const key = `${latitude} ${longitude}`;
    const place = places.get(key) ?? { latitude, longitude, references: [] };
    place.references.push(reference);
    places.set(key, place);
  }
  return [...places.values()];
}
