import { gzipSync } from 'node:zlib';
import { encodeSpectrogram } from '#lib/contracts/spectrogramBinary';
import { spectrogram } from '#lib/services/levels/spectrogram';
import { spectrogramJson } from '#lib/services/levels/spectrogramJson';
import { compare, digits, median, msOf, printTable } from './support/measure';
import { FIRST_SEC, fillMonth, MONTH_SEC } from './support/months';
import { withOwnSchema } from './support/schema';
import { makeNetwork, makeStation } from './support/station';

/** A month's spectrogram as bytes against as JSON: making the answer from columns, its size, and reading the columns before. */
const COLUMNS = [4000, 43_200];

await withOwnSchema(async () => {
  const station = await makeStation(await makeNetwork(), 'MINUTES', 60);
  await fillMonth(station);
  const rows: string[][] = [];
  for (const mostColumns of COLUMNS) {
    const query = { station, fromSec: FIRST_SEC, toSec: FIRST_SEC + MONTH_SEC, mostColumns };
    const columns = await spectrogram(query);
    const readMs: number[] = [];
    for (let turn = 0; turn < 3; turn += 1) readMs.push(await msOf(() => spectrogram(query)));
    const asBytes = () => encodeSpectrogram(columns);
    const asJson = () => Buffer.from(JSON.stringify(spectrogramJson(columns)));
    const { ms, againstMs } = await compare(
      7,
      async () => asBytes(),
      async () => asJson(),
    );
    const [bytes, json] = [asBytes(), asJson()];
    const [packedBytes, packedJson] = [gzipSync(bytes), gzipSync(json)];
    rows.push([
      `${columns.header.columns} (${columns.header.source})`,
      digits(median(againstMs) / median(ms)),
      digits(json.length / bytes.length),
      digits(packedJson.length / packedBytes.length),
      digits(median(ms)),
      digits(median(againstMs)),
      `${digits(bytes.length / 1000)} / ${digits(json.length / 1000)}`,
      `${digits(packedBytes.length / 1000)} / ${digits(packedJson.length / 1000)}`,
      digits(median(readMs)),
    ]);
  }
  printTable(
    [
      'columns',
      'time JSON ÷ bytes',
      'size JSON ÷ bytes',
      'the same gzipped',
      'bytes ms',
      'JSON ms',
      'kB bytes / JSON',
      'kB gzipped',
      'reading columns ms',
    ],
    rows,
  );
});
