/** What receiving needs of a request; both a web Request and what the HTTP front makes of Node's are one. */
export interface MonitorRequest {
  headers: { get(name: string): string | null };
  body: AsyncIterable<Uint8Array> | null;
}

/** A web request as receiving takes it. */
export function monitorRequestOf({ headers, body }: Request): MonitorRequest {
  // In Node a stream of the web can be iterated; the browser's types do not know.
  return { headers, body: body as (ReadableStream<Uint8Array> & AsyncIterable<Uint8Array>) | null };
}
