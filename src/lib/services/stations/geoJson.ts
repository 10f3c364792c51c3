import { type Station } from '#lib/contracts/stations';

/** Stations as a GeoJSON feature collection (RFC 7946): longitude first. */
export function stationsGeoJson(stations: readonly Station[]) {
  return {
    type: 'FeatureCollection',
    features: stations.map(({ latitude, longitude, ...properties }) => ({
      type: 'Feature',
      id: properties.code,
      geometry: { type: 'Point', coordinates: [longitude, latitude] },
      properties,
    })),
  };
}
