import { setTimeout as sleep } from 'node:timers/promises';
import { closeDb } from '#db/client';
import { listImports } from '#db/queries/imports';
import { findNetworkBySlug } from '#db/queries/networks';
import { findStation, type StationRow } from '#db/queries/stations';
import { findCredentials } from '#db/queries/users';
import { openImport } from '#ingest/imports/open';
import { type Import, type ImportAct } from '#lib/contracts/imports';
import { actOnImport } from '#lib/services/imports/act';
import { importOf } from '#lib/services/imports/list';
import { cardFile } from './cardFile';
import { CARD_STATIONS, SOAK_NETWORK, SOAK_PERSON } from './names';

/**
 * An operator who brings files to stations, stores them, undoes and redoes that, as the pages do it, and tries again whatever is
 * killed meanwhile. `bring.ts <first second of the files> <rows a file>`
 */
const [firstSec, rows] = process.argv.slice(2).map(Number);
const POLL_MS = 300;
const CYCLES = 3;
const GOALS: Import['state'][] = [
  'stored',
  ...Array.from({ length: CYCLES }, () => ['undone', 'stored'] as const).flat(),
];
const ACTS: Partial<Record<Import['state'], { act: ImportAct; reason: string | null }>> = {
  checked: { act: 'store', reason: null },
  stored: { act: 'undo', reason: 'A trial.' },
  undone: { act: 'redo', reason: null },
};

const network = await patiently(() => findNetworkBySlug(SOAK_NETWORK));
const person = await patiently(() => findCredentials(SOAK_PERSON));
if (!network || !person) throw new Error('The soak’s database is not prepared.');
const [networkId, userId] = [network.id, person.user.id];
await Promise.all(CARD_STATIONS.map((code, at) => bring(code, at)));
await closeDb().catch(() => undefined);

async function bring(code: string, seed: number): Promise<void> {
  const station = await patiently(() => findStation(networkId, code));
  if (!station) throw new Error(`${code} is not there.`);
  const id = await patiently(() => opened(station, seed));
  for (const goal of GOALS) await reach(id, goal);
}

/** The station's import; made unless an attempt whose answer was lost has made it. */
async function opened(station: StationRow, seed: number): Promise<number> {
  const [before] = await listImports(networkId, { limit: 1, beforeId: null, stationId: station.id });
  if (before) return before.id;
  const upload = { networkId, station, userId, fileName: 'card.csv', zone: 'UTC' };
  return (await openImport(upload, cardFile(seed, firstSec ?? 0, rows ?? 0))).id;
}

async function reach(id: number, goal: Import['state']): Promise<void> {
  for (;;) {
    const state = (await patiently(() => importOf(networkId, id)))?.state;
    if (state === goal) return;
    if (state === undefined || state === 'failed') throw new Error(`Import ${id} is ${state ?? 'gone'}.`);
    const next = ACTS[state];
    // An act whose answer was lost is not asked again: the state has moved on.
    if (next) await patiently(() => actOnImport({ networkId, id, userId, ...next }));
    await sleep(POLL_MS);
  }
}

/** Tries until it works: the database may be away, and whoever started this ends it. */
async function patiently<T>(work: () => Promise<T>): Promise<T> {
  for (;;) {
    try {
      return await work();
    } catch {
      await sleep(POLL_MS);
    }
  }
}
