import type { Chunks } from './monitorRequest';
import { Problem } from './problem';

/** What bodies that are being read, or wait for their turn, may hold of this process's memory all together. */
const MOST_HELD_BYTES = 64 * 1024 * 1024;
let heldBytes = 0;

/** A body's share of the memory that bodies may hold; to be released when the body is done with. */
export class HeldBytes {
  private count = 0;

  /** Reads a body, counting while it comes. @throws what `tooLarge` makes beyond the limit; {Problem} 503 when memory is full of bodies. */
  async collect(body: Chunks, mostBytes: number, tooLarge: () => Problem): Promise<Buffer> {
    const chunks: Uint8Array[] = [];
    await body.forEach((chunk) => {
      this.count += chunk.length;
      heldBytes += chunk.length;
      if (this.count > mostBytes) throw tooLarge();
      if (heldBytes > MOST_HELD_BYTES) throw fullOfBodies();
      chunks.push(chunk);
    });
    return Buffer.concat(chunks, this.count);
  }

  release(): void {
    heldBytes -= this.count;
    this.count = 0;
  }
}

function fullOfBodies(): Problem {
  return new Problem(
    503,
    'busy',
    'Not possible at the moment',
    'Too much is being received at once. Keep the records and try again.',
    { headers: { 'Retry-After': '5' } },
  );
}
