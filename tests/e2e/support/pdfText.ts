import { execFile } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';

/** The text of a PDF as a reader sees it, each run of white space as one space. */
export async function pdfText(pdf: Uint8Array): Promise<string> {
  const folder = await mkdtemp(join(tmpdir(), 'bittern-pdf-'));
  try {
    const file = join(folder, 'read.pdf');
    await writeFile(file, pdf);
    const { stdout } = await promisify(execFile)('pdftotext', ['-layout', file, '-']);
    return stdout.replace(/\s+/g, ' ');
  } finally {
    await rm(folder, { recursive: true });
  }
}
