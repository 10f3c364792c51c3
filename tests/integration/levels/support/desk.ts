import { expect } from 'vitest';
import { callApi } from '../../support/callApi';
import { makeNetwork, makePerson } from '../../support/people';

/** A network with its operator signed in. */
export interface Desk {
  networkId: number;
  userId: string;
  /** Reads a station's resource, such as `statistics`, over the interface. */
  read<T>(code: string, resource: string, query: Record<string, string>): Promise<T>;
}

/** Makes a network in Europe/London, and an operator of it. */
export async function makeDesk(slug: string): Promise<Desk> {
  const networkId = await makeNetwork(slug);
  const { userId, session } = await makePerson(networkId, ['operator']);
  return {
    networkId,
    userId,
    async read<T>(code: string, resource: string, query: Record<string, string>) {
      const search = new URLSearchParams(query).toString();
      const path = `/api/v1/networks/${slug}/stations/${code}/${resource}?${search}`;
      const response = await callApi('GET', path, { session });
      expect(response.status, await response.clone().text()).toBe(200);
      return (await response.json()) as T;
    },
  };
}

/** Epoch seconds of an RFC 3339 instant. */
export function sec(instant: string): number {
  return Date.parse(instant) / 1000;
}

/** Expects two levels to agree to a millionth of a dB, or both to be null. */
export function expectSameLevel(
  actual: number | null | undefined,
  wanted: number | null,
  what: string,
): void {
  if (wanted === null || actual === null || actual === undefined) expect(actual, what).toBe(wanted);
  else expect(Math.abs(actual - wanted), `${what}: ${actual} for ${wanted}`).toBeLessThanOrEqual(1e-6);
}
