import { ROUTE_FAMILIES } from '#lib/contracts/accessTokens';
import { Problem } from '#lib/http/problem';

const READING = new Set(['GET', 'HEAD']);
/** Who one is, and which networks there are: open to every token. */
const ALWAYS = /^\/api\/v1\/(?:me|networks(?:\/[^/]+)?)$/;

/** Refuses what a token is not made for. @throws {Problem} 403 */
export function requireScope(
  { access, families }: { access: 'read' | 'change'; families: readonly string[] | null },
  method: string,
  pathname: string,
): void {
  const isReading = READING.has(method);
  if (access === 'read' && !isReading) throw outside('This access token reads, and changes nothing.');
  if (families === null || (isReading && ALWAYS.test(pathname))) return;
  const family = familyOf(pathname);
  if (!family || !families.includes(family)) {
    throw outside(`This access token opens ${families.join(', ')} alone.`);
  }
}

/** The family that a route belongs to; null for what no token of families opens. */
export function familyOf(pathname: string): string | null {
  const segment = /^\/api\/v1\/networks\/[^/]+\/([^/.]+)/.exec(pathname)?.[1];
  const found = Object.entries(ROUTE_FAMILIES).find(([, segments]) =>
    (segments as readonly string[]).includes(segment ?? ''),
  );
  return found?.[0] ?? null;
}

const outside = (detail: string) => new Problem(403, 'outside-scope', 'Not what this token is for', detail);
