import { config } from '#lib/config/index';

/** Whether the public address is https, so that cookies go over nothing else. */
export function isHttps(): boolean {
  return config().origin.startsWith('https:');
}

/**
 * Name of a cookie for the whole site. Where the public address is https it begins with `__Host-`: browsers then take it only from this very
 * host, over https and for every path, so that no neighbour under the same domain can set it.
 */
export function cookieName(name: string): string {
  return isHttps() ? `__Host-bittern-${name}` : `bittern-${name}`;
}

/** Name of a cookie for one path; `__Secure-` where the public address is https. */
export function pathCookieName(name: string): string {
  return isHttps() ? `__Secure-bittern-${name}` : `bittern-${name}`;
}
