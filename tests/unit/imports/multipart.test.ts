import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { formParts, textOf } from '#lib/http/multipart';

const BOUNDARY = '----form7';
const FORM = [
  `--${BOUNDARY}`,
  'Content-Disposition: form-data; name="station"',
  '',
  'QY-1',
  `--${BOUNDARY}`,
  'Content-Disposition: form-data; name="file"; filename="a \u2013 b.csv"',
  'Content-Type: text/csv',
  '',
  'start,LAeq\r\n1,2\r\n--not the mark\r\n',
  `--${BOUNDARY}--`,
  '',
].join('\r\n');

function request(body: Buffer, sizes: readonly number[]): Request {
  const stream = new ReadableStream<Uint8Array>({
    start(controller) {
      for (let at = 0, turn = 0; at < body.length; turn += 1) {
        const size = sizes[turn % sizes.length] ?? 1;
        controller.enqueue(new Uint8Array(body.subarray(at, at + size)));
        at += size;
      }
      controller.close();
    },
  });
  return new Request('http://127.0.0.1/', {
    method: 'POST',
    body: stream,
    duplex: 'half',
    headers: { 'content-type': `multipart/form-data; boundary=${BOUNDARY}` },
  } as RequestInit);
}

async function readAll(asked: Request) {
  const read: [string, string | null, string][] = [];
  for await (const { name, fileName, body } of formParts(asked)) {
    read.push([name, fileName, await textOf(body, 10_000)]);
  }
  return read;
}

describe('a form with a file', () => {
  test('is read the same however it comes in', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.array(fc.integer({ min: 1, max: 80 }), { minLength: 1, maxLength: 6 }),
        async (sizes) => {
          expect(await readAll(request(Buffer.from(FORM), sizes))).toEqual([
            ['station', null, 'QY-1'],
            ['file', 'a \u2013 b.csv', 'start,LAeq\r\n1,2\r\n--not the mark\r\n'],
          ]);
        },
      ),
      { numRuns: 60 },
    );
  });

  test('may have parts passed over', async () => {
    const names: string[] = [];
    for await (const { name } of formParts(request(Buffer.from(FORM), [7]))) names.push(name);
    expect(names).toEqual(['station', 'file']);
  });

  test('that breaks off, or is none, is refused', async () => {
    await expect(readAll(request(Buffer.from(FORM.slice(0, -20)), [50]))).rejects.toMatchObject({
      status: 400,
    });
    const other = new Request('http://127.0.0.1/', { method: 'POST', body: 'a=b' });
    await expect(readAll(other)).rejects.toMatchObject({ status: 400 });
  });
});
