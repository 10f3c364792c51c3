import { writeFile } from 'node:fs/promises';
import { devNull } from 'node:os';
import { db } from '#db/client';
import { findNetworkBySlug } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import { DEFAULT_SUMMARY_TEMPLATE } from '#lib/contracts/summaryTemplate';
import { computeMonth } from '#lib/services/summaries/document/computeMonth';
import { FILE_FORMATS, renderFiles } from '#lib/services/summaries/document/render';
import { digits, msOf, printTable } from './support/measure';
import { residentMib } from './support/memory';
import { fillMonth, FIRST_SEC } from './support/months';
import { withOwnSchema } from './support/schema';
import { makeNetwork, makeStation } from './support/station';

/**
 * How long a network’s month takes from asking to its files, at 8 and at 100 stations of minutes with 31 thirds, and the highest memory
 * of the process. Targets: 5 s and 60 s, under 500 MiB. `SUMMARY_STATIONS=8` asks for one size alone.
 */
const SIZES = (process.env['SUMMARY_STATIONS'] ?? '8,100').split(',').map(Number);
const TABLES = ['interval_levels', 'quarter_hours', 'day_periods'] as const;
const AS_OF = new Date((FIRST_SEC + 40 * 86_400) * 1000);

await withOwnSchema(async () => {
  const networkId = await makeNetwork('bench');
  const first = await makeStation(networkId, 'S000', 60);
  await fillMonth(first);
  const network = await findNetworkBySlug('bench');
  if (!network) throw new Error('The network that was added is not there.');
  const rows: string[][] = [];
  let stations = 1;
  for (const size of SIZES) {
    for (; stations < size; stations += 1) {
      const code = `S${String(stations).padStart(3, '0')}`;
      await copy(first, await makeStation(networkId, code, 60));
    }
    await db()('stations').update({ created_at: new Date((FIRST_SEC - 86_400) * 1000) });
    rows.push(await row(network, size));
  }
  printTable(
    [
      'stations',
      'computed s',
      'of it processor s',
      ...FILE_FORMATS.map((format) => `${format} s`),
      'all s',
      'highest MiB',
    ],
    rows,
  );
});

async function row(network: { id: number; slug: string; name: string }, size: number): Promise<string[]> {
  let told = 0;
  const before = process.cpuUsage();
  let document: Awaited<ReturnType<typeof computeMonth>> | undefined;
  const computedMs = await msOf(async () => {
    document = await computeMonth(network, '2025-01', AS_OF, { onProgress: () => (told += 1) });
  });
  const { user, system } = process.cpuUsage(before);
  if (!document || document.stations.length !== size || told !== size) {
    throw new Error(
      `${document?.stations.length} stations and ${told} steps of progress for ${size} stations.`,
    );
  }
  const doc = document;
  const context = { template: DEFAULT_SUMMARY_TEMPLATE, revision: null };
  const ms: number[] = [];
  for (const format of FILE_FORMATS) {
    ms.push(
      await msOf(async () => {
        const [file] = await renderFiles(doc, context, [format]);
        await writeFile(devNull, file?.bytes ?? '');
      }),
    );
  }
  const all = computedMs + ms.reduce((sum, one) => sum + one, 0);
  return [
    String(size),
    digits(computedMs / 1000),
    digits((user + system) / 1e6),
    ...ms.map((one) => digits(one / 1000)),
    digits(all / 1000),
    digits(residentMib(process.pid).highest),
  ];
}

/** Gives a station the rows of another one. */
async function copy(from: StationRow, to: StationRow): Promise<void> {
  for (const table of TABLES) {
    const [columns] = (await db().raw(`SHOW COLUMNS FROM ${table}`)) as [{ Field: string }[]];
    const names = columns.map(({ Field }) => Field);
    const cells = names.map((name) => (name === 'station_id' ? String(to.id) : name));
    await db().raw(
      `INSERT INTO ${table} (${names.join(', ')}) SELECT ${cells.join(', ')} FROM ${table} WHERE station_id = ?`,
      [from.id],
    );
  }
}
