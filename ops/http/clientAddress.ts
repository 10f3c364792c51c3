import type { IncomingMessage } from 'node:http';
import { BlockList, isIP } from 'node:net';

/** Whether what stands at an address, `hop` steps before us, is believed about the one before it. */
export type TrustsProxy = (address: string, hop: number) => boolean;

/** Reads the setting: a number of proxies, or the addresses and blocks (`10.0.0.0/8`) of those that are believed. */
export function proxyTrust(setting: number | string[]): TrustsProxy {
  if (typeof setting === 'number') return (_, hop) => hop < setting;
  const known = new BlockList();
  for (const item of setting) {
    const [address = '', prefix] = item.split('/');
    const family = isIP(address) === 6 ? 'ipv6' : 'ipv4';
    known.addSubnet(address, Number(prefix ?? (family === 'ipv6' ? 128 : 32)), family);
  }
  return (address) => isIP(address) > 0 && known.check(address, isIP(address) === 6 ? 'ipv6' : 'ipv4');
}

/**
 * The address that a request comes from: the other end of the line, or, where that is a proxy that is believed, what it tells of the one before
 * it, and so on. Where none is believed headers say nothing.
 */
export function clientAddress({ socket, headers }: IncomingMessage, trusts: TrustsProxy): string {
  const told = headers['x-forwarded-for'];
  const forwarded = typeof told === 'string' ? told.split(',').map((address) => address.trim()) : [];
  const nearestFirst = [socket.remoteAddress ?? '', ...forwarded.reverse()];
  const first = nearestFirst.findIndex((address, hop) => !trusts(address, hop));
  return nearestFirst.at(first) ?? '';
}
