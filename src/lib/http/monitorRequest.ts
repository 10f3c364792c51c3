/** What receiving needs of a request; both a web Request and what the HTTP front makes of Node's are one. */
export interface MonitorRequest {
  headers: { get(name: string): string | null };
  body: Chunks | null;
}

/** A body that is still to come. */
export interface Chunks {
  /** Hands over chunk by chunk until the end; what `take` throws, or a broken line, ends it. */
  forEach(take: (chunk: Uint8Array) => void): Promise<void>;
}

/** A web request as receiving takes it. */
export function monitorRequestOf({ headers, body }: Request): MonitorRequest {
  return { headers, body: body && chunksOf(body) };
}

function chunksOf(body: ReadableStream<Uint8Array>): Chunks {
  // In Node a stream of the web can be iterated; the browser's types do not know.
  const iterable = body as ReadableStream<Uint8Array> & AsyncIterable<Uint8Array>;
  return {
    async forEach(take) {
      for await (const chunk of iterable) take(chunk);
    },
  };
}
