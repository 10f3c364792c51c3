import { type StationRow } from '#db/queries/stations';
import { bandAt } from '#lib/acoustics/bands';
import { formatInstantUtc } from '#lib/contracts/common';
import { parseUrlInstant, urlInstant } from '#lib/time/urlPeriod';

/** What the station form shows of a station, by field. */
export function stationFormText(station: StationRow, zone: string): Record<string, string> {
  const hzOf = (index: number) => String(bandAt(station.bandFraction, index).nominalHz);
  return {
    name: station.name,
    latitude: String(station.latitude),
    longitude: String(station.longitude),
    placement: station.placement,
    facadeCorrection: String(station.facadeCorrectionDb),
    placementFrom: '',
    mastHeight: station.mastHeightM === null ? '' : String(station.mastHeightM),
    surroundings: station.surroundings,
    bandFraction: String(station.bandFraction),
    firstBandHz: hzOf(station.firstBandIndex),
    lastBandHz: hzOf(station.lastBandIndex),
    intervalSeconds: String(station.intervalSec),
    acceptsFrom: station.acceptsFromSec === null ? '' : urlInstant(station.acceptsFromSec, zone),
  };
}

/** What a form for a station that is new shows at first: a one-minute monitor of one-third octaves. */
export const NEW_STATION_TEXT: Readonly<Record<string, string>> = {
  placement: 'free-field',
  facadeCorrection: '3',
  bandFraction: '3',
  firstBandHz: '25',
  lastBandHz: '10000',
  intervalSeconds: '60',
};

/**
 * A time as typed, local to `zone` unless it carries an offset, as the interface's JSON has it; null for an empty field. What
 * cannot be read stays as it is, for the schema to refuse.
 */
export function typedInstant(text: string, zone: string): string | null {
  if (text === '') return null;
  const sec = parseUrlInstant(text, zone);
  return sec === null ? text : formatInstantUtc(sec);
}
