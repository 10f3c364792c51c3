import { formatInstantUtc } from '#lib/contracts/common';
import { parseUrlInstant } from '#lib/time/urlPeriod';

/** The address that a filter form makes, as the interface takes it: empty fields left out, local times in UTC. */
export function askedInUtc(url: URL, zone: string): URL {
  const asked = new URL(url);
  for (const [name, value] of url.searchParams) {
    if (value === '') asked.searchParams.delete(name);
  }
  for (const name of ['from', 'to']) {
    const text = asked.searchParams.get(name);
    const sec = text === null ? null : parseUrlInstant(text, zone);
    if (sec !== null) asked.searchParams.set(name, formatInstantUtc(sec));
  }
  return asked;
}
