import type { IncomingMessage } from 'node:http';

/** What a client must get through between two looks; far below the slowest modem of a monitor. */
const LEAST_BYTES = 2_500;
const LOOK_MS = 10_000;

/**
 * Ends requests whose body dribbles, so that few clients cannot hold many connections. Who waits because we do not read on is left alone. The
 * time that a request may take in all is the server's `requestTimeout`.
 */
export class BodyPace {
  /** What had come of each at the last look; null before its first, which may be a moment after its start. */
  readonly #bytesBefore = new Map<IncomingMessage, number | null>();

  /** Follows a request until its body is there or its connection is gone. */
  watch(request: IncomingMessage): void {
    const { headers } = request;
    const hasBody = headers['transfer-encoding'] !== undefined || Number(headers['content-length'] ?? 0) > 0;
    if (!hasBody) return;
    this.#bytesBefore.set(request, null);
    const forget = () => this.#bytesBefore.delete(request);
    request.once('end', forget).once('close', forget);
  }

  /** Looks at all that are followed; those that got through too little since the last look are ended. */
  look(): void {
    for (const [request, before] of this.#bytesBefore) {
      const now = request.socket.bytesRead;
      this.#bytesBefore.set(request, now);
      const waitsForUs = request.complete || request.readableLength > 0;
      if (before !== null && !waitsForUs && now - before < LEAST_BYTES) request.destroy();
    }
  }

  /** Looks every ten seconds, for as long as the process has other work. */
  start(): void {
    setInterval(() => this.look(), LOOK_MS).unref();
  }
}
