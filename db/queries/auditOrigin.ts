import { AsyncLocalStorage } from 'node:async_hooks';

/** As long as an IPv6 address can be. */
const MOST_CHARS = 45;
const origins = new AsyncLocalStorage<string>();

/** Does something for a request from an IP address: what a signed-in person does in it is noted with that address. */
export function actingFrom<T>(address: string, act: () => T): T {
  return origins.run(address.slice(0, MOST_CHARS), act);
}

/** The address of the request under way; null outside of one, as in the worker. */
export function originAddress(): string | null {
  return origins.getStore() ?? null;
}
