import { randomUUID } from 'node:crypto';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { findWorkingImport } from '#db/queries/imports';
import { type StationRow } from '#db/queries/stations';
import { advanceImports } from '#ingest/imports/advance';
import { openImport } from '#ingest/imports/open';
import { bandRange } from '#lib/acoustics/bands';
import { actOnImport } from '#lib/services/imports/act';
import { importOf } from '#lib/services/imports/list';
import { CSV_LEADING, CSV_TRAILING } from '#lib/services/intervals/csv';
import { digits, msOf, printTable } from './support/measure';
import { withOwnSchema } from './support/schema';
import { makeNetwork, makeStation } from './support/station';

/**
 * A file of seconds with 31 thirds: uploaded, checked, stored and undone, as the web and the worker do it, in this one process.
 * Rows a second of each step, and the highest resident memory so far. `npx tsx ops/bench/imports.ts [rows]`; a month is 2,600,000.
 */
const rows = Number(process.argv[2] ?? 300_000);
const FIRST_SEC = Date.parse('2025-01-01T00:00:00Z') / 1000;
const BANDS = bandRange(3, 20, 20_000).map(({ nominalHz }) => nominalHz);
const userId = randomUUID();

const directory = await mkdtemp(join(tmpdir(), 'bittern-bench-imports-'));
process.env['BITTERN_DATA_DIR'] = directory;
process.env['BITTERN_IMPORT_MAX_MIB'] = '4096';
try {
  await withOwnSchema(run);
} finally {
  await rm(directory, { recursive: true, force: true });
}

async function run(): Promise<void> {
  const networkId = await makeNetwork();
  const station = await makeStation(networkId, 'CARD', 1);
  const table: string[][] = [];
  const measure = async (what: string, work: () => Promise<unknown>) => {
    const ms = await msOf(work);
    table.push([what, digits(ms / 1000), digits((1000 * rows) / ms), digits(peakMib())]);
  };
  table.push(['before', '', '', digits(peakMib())]);
  await measure('upload', () => upload(station));
  await measure('check', workAll);
  const act = (name: 'store' | 'undo') =>
    actOnImport({ networkId, id: 1, userId, act: name, reason: 'A benchmark.' }).then(workAll);
  await measure('store', () => act('store'));
  const stored = await importOf(networkId, 1);
  await measure('undo', () => act('undo'));
  console.log(
    `\n${digits((stored?.bytes ?? 0) / 1e6)} MB, ${digits(stored?.stored ?? 0)} intervals stored.\n`,
  );
  printTable(['step', 's', 'rows/s', 'highest resident MiB'], table);
}

function upload(station: StationRow): Promise<unknown> {
  const { networkId } = station;
  return openImport({ networkId, station, userId, fileName: 'card.csv', zone: 'UTC' }, fileOf());
}

async function* fileOf(): AsyncGenerator<Buffer> {
  yield Buffer.from(`${[...CSV_LEADING, ...BANDS, ...CSV_TRAILING].join(',')}\r\n`);
  const rowsAPart = 1000;
  for (let first = 0; first < rows; first += rowsAPart) {
    const count = Math.min(rowsAPart, rows - first);
    yield Buffer.from(Array.from({ length: count }, (_, at) => lineOf(first + at)).join(''));
  }
}

function lineOf(at: number): string {
  const start = new Date((FIRST_SEC + at) * 1000).toISOString().replace('.000', '');
  const level = (shift: number) => (3000 + ((at * 7919 + shift * 104_729) % 5000)) / 100;
  const bands = BANDS.map((_, band) => level(band));
  return `${start},1,${level(40)},${level(41) + 20},${level(42) - 20},${level(43)},,${bands.join(',')},,2.31,270,11.5,12.4\r\n`;
}

async function workAll(): Promise<void> {
  while (await findWorkingImport()) await advanceImports();
}

function peakMib(): number {
  return process.resourceUsage().maxRSS / 1024;
}
