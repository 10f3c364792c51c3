import { config } from '#lib/config/index';
import { notAllowed } from './problem';

const SAFE_METHODS = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses a change that a browser sends from elsewhere. A request with a bearer token carries no cookie's power, and one
 * without Origin and Sec-Fetch-Site does not come from a browser's page.
 * @throws {Problem} 403
 */
export function requireSameOrigin(request: Request): void {
  if (SAFE_METHODS.has(request.method) || request.headers.has('authorization')) return;
  const site = request.headers.get('sec-fetch-site');
  const origin = request.headers.get('origin');
  const isForeign =
    site === null ? origin !== null && !isOwnOrigin(origin) : site !== 'same-origin' && site !== 'none';
  if (isForeign) throw notAllowed('This change was sent from another site.');
}

function isOwnOrigin(origin: string): boolean {
  if (origin === config().origin) return true;
  return URL.canParse(origin) && config().allowedHosts.includes(new URL(origin).host);
}
