import type { IncomingMessage } from 'node:http';

/**
 * The address that a request comes from, where so many proxies in front are believed: the last of these tells the one before it, and so on.
 * With none it is the other end of the line, whatever headers say.
 */
export function clientAddress({ socket, headers }: IncomingMessage, trustedProxies: number): string {
  const end = socket.remoteAddress ?? '';
  if (trustedProxies === 0) return end;
  const told = headers['x-forwarded-for'];
  const forwarded = typeof told === 'string' ? told.split(',').map((address) => address.trim()) : [];
  const nearestFirst = [end, ...forwarded.reverse()];
  return nearestFirst[Math.min(trustedProxies, nearestFirst.length - 1)] ?? end;
}
