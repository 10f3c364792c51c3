import { Zip, ZipPassThrough } from 'fflate';
import { type IssuedFileRow, type IssuedSummaryRow } from '#db/queries/issuedSummaries';
import { listSummaryKeys } from '#db/queries/summaryKeys';
import { type NetworkRow } from '#db/queries/networks';
import { publicKeyJson } from '../seal/keys';
import { issuedFiles, issuedSummary, openIssuedFile } from '../seal/files';

interface Entry {
  name: string;
  bytes: () => AsyncIterable<Uint8Array>;
}

/**
 * Files of the latest issued revision of each month, each month’s with its manifest, signature and public key, as a ZIP that is written while it is sent:
 * one part of one file stands in memory. Null where none is issued. A file that is damaged breaks the stream off.
 */
export async function archiveOf(
  network: NetworkRow,
  months: readonly string[],
  formats: readonly string[] | null,
): Promise<ReadableStream<Uint8Array> | null> {
  const entries: Entry[] = [];
  for (const month of months) {
    const issued = await issuedSummary(network.id, month, null);
    if (issued) entries.push(...(await entriesOf(network, issued.row, formats)));
  }
  return entries.length === 0 ? null : zipped(entries);
}

async function entriesOf(
  { id, slug }: NetworkRow,
  row: IssuedSummaryRow,
  formats: readonly string[] | null,
): Promise<Entry[]> {
  const files = await issuedFiles(row.id, formats);
  const name = `${slug}-${row.month}-r${row.revision}`;
  const key = (await listSummaryKeys(id)).find((one) => one.id === row.keyId);
  const text = (ending: string, content: string | Buffer): Entry => ({
    name: `${name}.${ending}`,
    bytes: () => once(Buffer.from(content)),
  });
  return [
    ...files.map((file) => ({ name: file.name, bytes: () => bytesOf(file) })),
    text('manifest.json', row.manifest),
    text('manifest.sig', row.signature),
    ...(key ? [text('key.pem', publicKeyJson(key).pem)] : []),
  ];
}

async function* bytesOf(file: IssuedFileRow): AsyncGenerator<Uint8Array> {
  const stream = await openIssuedFile(file);
  if (!stream) throw new Error(`${file.name} is damaged.`);
  yield* stream as AsyncIterable<Buffer>;
}

async function* once(bytes: Uint8Array): AsyncGenerator<Uint8Array> {
  yield bytes;
}

function zipped(entries: readonly Entry[]): ReadableStream<Uint8Array> {
  const parts = zipParts(entries);
  return new ReadableStream({
    async pull(controller) {
      const { done, value } = await parts.next();
      if (done) controller.close();
      else controller.enqueue(value);
    },
    async cancel() {
      await parts.return(undefined);
    },
  });
}

async function* zipParts(entries: readonly Entry[]): AsyncGenerator<Uint8Array> {
  let ready: Uint8Array[] = [];
  const zip = new Zip((error, part) => {
    if (error) throw error;
    ready.push(part);
  });
  for (const { name, bytes } of entries) {
    const file = new ZipPassThrough(name);
    zip.add(file);
    for await (const part of bytes()) {
      file.push(part);
      yield* ready;
      ready = [];
    }
    file.push(new Uint8Array(), true);
  }
  zip.end();
  yield* ready;
}
