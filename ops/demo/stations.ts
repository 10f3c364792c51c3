import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { db } from '#db/client';
import type { StationRow } from '#db/queries/stations';
import { FACADE_CORRECTION_DB } from '#lib/acoustics/facade';
import { EXPECTED_FLAGS } from '#lib/contracts/stations';
import { registerStation } from '#lib/services/stations/register';
import type { MonitorSetup } from '#ingest/monitor/soundscape/record';
import { STATION_SITES, type StationSite } from '#ops/standins/tiles/sites';

const DAY_MS = 86_400_000;

/** Stations without a weather sensor: they go by the port's mast. */
export const STATIONS_WITHOUT_SENSOR: readonly string[] = ['MER-02', 'MER-03'];

/** What a station's monitor measures. */
export function setupOf({ code, bandFraction, intervalSec }: StationSite): MonitorSetup {
  const range =
    bandFraction === 3 ? { firstBandHz: 20, lastBandHz: 20_000 } : { firstBandHz: 31.5, lastBandHz: 16_000 };
  const hasWeatherSensor = !STATIONS_WITHOUT_SENSOR.includes(code);
  return { bandFraction, intervalSec, hasWeatherSensor, ...range };
}

export interface DemoStation {
  site: StationSite;
  station: StationRow;
}

/** Registers the eight stations, as an operator would, and keeps their tokens for the simulated monitors. */
export async function seedStations(
  networkId: number,
  operatorId: string,
  dataDirectory: string,
  historyDays: number,
): Promise<DemoStation[]> {
  const stations: DemoStation[] = [];
  const tokens: Record<string, string> = {};
  for (const site of STATION_SITES) {
    const { firstBandHz, lastBandHz } = setupOf(site);
    const registration = await registerStation(
      networkId,
      {
        code: site.code,
        name: site.name,
        latitude: site.latitude,
        longitude: site.longitude,
        bandFraction: site.bandFraction,
        intervalSeconds: site.intervalSec,
        firstBandHz,
        lastBandHz,
        placement: site.placement,
        facadeCorrection: FACADE_CORRECTION_DB,
        mastHeight: site.mastHeightM,
        surroundings: site.surroundings,
        acceptsFrom: null,
        expectedFlags: [...EXPECTED_FLAGS],
      },
      operatorId,
    );
    if (registration.outcome !== 'registered') throw new Error(`The code ${site.code} is taken.`);
    const createdAt = new Date(Date.now() - (site.joinedDaysAgo ?? historyDays) * DAY_MS);
    await db()('stations').where({ id: registration.station.id }).update({ created_at: createdAt });
    tokens[site.code] = registration.token;
    stations.push({ site, station: registration.station });
  }
  writeTokens(dataDirectory, tokens);
  return stations;
}

function tokensPath(dataDirectory: string): string {
  return join(dataDirectory, 'demo', 'tokens.json');
}

function writeTokens(dataDirectory: string, tokens: Record<string, string>): void {
  mkdirSync(join(dataDirectory, 'demo'), { recursive: true, mode: 0o700 });
  writeFileSync(tokensPath(dataDirectory), JSON.stringify(tokens), { mode: 0o600 });
}

/** Station tokens of the simulated monitors by station code. */
export function readTokens(dataDirectory: string): Record<string, string> {
  return JSON.parse(readFileSync(tokensPath(dataDirectory), 'utf8')) as Record<string, string>;
}
