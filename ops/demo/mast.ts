import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout } from 'node:timers/promises';
import { findMast } from '#db/queries/masts';
import { addMast } from '#lib/services/weather/masts';
import { assignMast } from '#lib/services/weather/assign';
import { receiveWeather } from '#lib/services/weather/receive';
import { weatherAt } from '#ingest/monitor/soundscape/weather';
import { must } from './must';
import { STATIONS_WITHOUT_SENSOR } from './stations';

const CODE = 'MER-W1';
const RECORD_SEC = 600;
const DAY_SEC = 86_400;

/** What the mast notes in ten minutes: the estuary's weather, a little windier than between the houses. */
function recordAt(startSec: number) {
  const { windSpeedMs, windDirectionDeg, temperatureC, isRaining } = weatherAt(startSec + RECORD_SEC / 2);
  return {
    start: new Date(startSec * 1000).toISOString().replace('.000Z', 'Z'),
    seconds: RECORD_SEC,
    windSpeed: Math.round(windSpeedMs * 11) / 10,
    windDirection: Math.floor(windDirectionDeg),
    rain: isRaining ? 0.2 : 0,
    temperature: Math.round(temperatureC * 10) / 10,
  };
}

function recordsOf(fromSec: number, toSec: number) {
  const first = Math.ceil(fromSec / RECORD_SEC);
  const count = Math.max(0, Math.floor(toSec / RECORD_SEC) - first);
  return Array.from({ length: count }, (_, at) => recordAt((first + at) * RECORD_SEC));
}

/** Adds the mast at the port, assigns it, and brings its past; answers how many records. */
export async function seedMast(
  networkId: number,
  userId: string,
  dataDirectory: string,
  span: { fromSec: number; nowSec: number },
): Promise<number> {
  const facts = { code: CODE, name: 'Port signal mast', height: 10, maximumAge: 15 };
  const place = { latitude: 54.0915, longitude: 1.6105 };
  const { token } = must(await addMast(networkId, { ...facts, ...place }, userId));
  mkdirSync(join(dataDirectory, 'demo'), { recursive: true, mode: 0o700 });
  writeFileSync(tokenPath(dataDirectory), token, { mode: 0o600 });
  for (const station of STATIONS_WITHOUT_SENSOR)
    must(await assignMast({ networkId, userId }, CODE, { station, from: span.fromSec }));
  const mast = await findMast(networkId, CODE);
  if (!mast) throw new Error('The mast just added is not there.');
  const records = recordsOf(span.fromSec, span.nowSec);
  return (await receiveWeather(mast, records, new Date(span.nowSec * 1000))).accepted;
}

/**
 * Posts the mast's records as they end, again and again until `signal` aborts: those stored before are known. A demo made before it
 * had a mast has none to post for.
 */
export async function runMast(serverUrl: string, dataDirectory: string, signal: AbortSignal): Promise<void> {
  if (!existsSync(tokenPath(dataDirectory))) return;
  const token = readFileSync(tokenPath(dataDirectory), 'utf8');
  for (let memorySec = 3 * DAY_SEC; !signal.aborted;) {
    const nowSec = Math.floor(Date.now() / 1000);
    const headers = { 'Content-Type': 'application/json', Authorization: `Bearer ${token}` };
    const body = JSON.stringify({ records: recordsOf(nowSec - memorySec, nowSec) });
    const answer = await fetch(`${serverUrl}/api/v1/weather`, {
      method: 'POST',
      headers,
      body,
      signal,
    }).catch(() => null);
    if (answer?.ok) memorySec = 6 * 3600;
    await setTimeout(60_000, null, { signal }).catch(() => null);
  }
}

function tokenPath(dataDirectory: string): string {
  return join(dataDirectory, 'demo', 'mast-token');
}
