import type { IncomingMessage } from 'node:http';

/** How long, and how much, is read of a body that was refused. */
export interface LingerBounds {
  longestMs: number;
  mostBytes: number;
}

const BOUNDS: LingerBounds = { longestMs: 5_000, mostBytes: 64 * 1024 * 1024 };
const LOOK_MS = 50;

/**
 * Has a connection that is closed before a body was read in full close in turn: the answer and our end of it go first, and what still
 * comes is read and thrown away for a while. A connection that is closed with bytes unread is reset, and a client or proxy that is
 * still sending loses the answer with it (RFC 9112, section 9.6). Called before the answer.
 */
export function closeLingering(
  request: IncomingMessage,
  { longestMs, mostBytes }: LingerBounds = BOUNDS,
): void {
  const { socket } = request;
  // What Node calls after an answer with "Connection: close".
  socket.destroySoon = () => {
    if (socket.writable) socket.end();
    if (request.complete || request.destroyed) return destroyOnceWritten();
    const bytesBefore = socket.bytesRead;
    const startedMs = Date.now();
    const look = setInterval(() => {
      const isOver = Date.now() - startedMs > longestMs || socket.bytesRead - bytesBefore > mostBytes;
      if (isOver || request.complete) socket.destroy();
      // Whoever was reading may take a moment to let go of it.
      else request.resume();
    }, LOOK_MS);
    socket.once('close', () => clearInterval(look));
    request.resume();
  };

  function destroyOnceWritten(): void {
    if (socket.writableFinished) socket.destroy();
    else socket.once('finish', () => socket.destroy());
  }
}
