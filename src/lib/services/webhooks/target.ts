import { lookup as resolve, type LookupAddress, type LookupAllOptions } from 'node:dns';
import { BlockList, isIP } from 'node:net';

const LOOPBACK = new BlockList();
LOOPBACK.addSubnet('127.0.0.0', 8, 'ipv4');
LOOPBACK.addAddress('::1', 'ipv6');

/** IPv4 that is not on the public internet (IANA special-purpose registry). */
const NOT_PUBLIC = new BlockList();
for (const [network, prefix] of [
  ['0.0.0.0', 8],
  ['10.0.0.0', 8],
  ['100.64.0.0', 10],
  ['127.0.0.0', 8],
  ['169.254.0.0', 16],
  ['172.16.0.0', 12],
  ['192.0.0.0', 24],
  ['192.0.2.0', 24],
  ['192.88.99.0', 24],
  ['192.168.0.0', 16],
  ['198.18.0.0', 15],
  ['198.51.100.0', 24],
  ['203.0.113.0', 24],
  ['224.0.0.0', 3],
] as const) {
  NOT_PUBLIC.addSubnet(network, prefix, 'ipv4');
}
/** Within the global unicast space: assignments, documentation, and 6to4, which holds an IPv4 address. */
for (const [network, prefix] of [
  ['2001::', 23],
  ['2001:db8::', 32],
  ['2002::', 16],
  ['3fff::', 20],
] as const) {
  NOT_PUBLIC.addSubnet(network, prefix, 'ipv6');
}
const GLOBAL_UNICAST = new BlockList();
GLOBAL_UNICAST.addSubnet('2000::', 3, 'ipv6');

/** Whether an IP address is on the public internet, so that nothing of the machine's own surroundings is reached. */
export function isPublicAddress(address: string): boolean {
  if (isIP(address) === 4) return !NOT_PUBLIC.check(address, 'ipv4');
  if (isIP(address) !== 6) return false;
  return GLOBAL_UNICAST.check(address, 'ipv6') && !NOT_PUBLIC.check(address, 'ipv6');
}

function isLoopback(address: string): boolean {
  return LOOPBACK.check(address, isIP(address) === 6 ? 'ipv6' : 'ipv4');
}

/** Whether events may be sent to an IP address. */
function mayReach(address: string, mayLoopBack: boolean): boolean {
  return isPublicAddress(address) || (mayLoopBack && isLoopback(address));
}

/**
 * What is wrong with an address to post events to, in words; null: nothing that can be told without asking for its name. It is
 * https, with no name or password in it; http only to this machine itself, where the settings let it.
 */
export function targetProblem(text: string, mayLoopBack: boolean): string | null {
  if (!URL.canParse(text)) return 'must be an address such as https://alerts.quay.example/noise';
  const url = new URL(text);
  const host = hostOf(url);
  const isOwn = mayLoopBack && (host === 'localhost' || (isIP(host) > 0 && isLoopback(host)));
  if (url.protocol !== 'https:' && !(isOwn && url.protocol === 'http:')) return 'must begin with https://';
  if (url.username !== '' || url.password !== '') return 'must hold no name or password: events are signed';
  if (isIP(host) > 0 && !mayReach(host, mayLoopBack)) return 'must be on the public internet';
  if (!isOwn && (host === 'localhost' || host.endsWith('.localhost')))
    return 'must be on the public internet';
  return null;
}

/** Host of an address, an IPv6 address without its brackets. */
function hostOf(url: URL): string {
  return url.hostname.replace(/^\[|\]$/g, '').toLowerCase();
}

type Answer = (error: Error | null, address: string | LookupAddress[], family?: number) => void;

/**
 * Looks a name up for a connection and refuses it where any of its addresses may not be reached. The connection goes to the very
 * addresses that were judged, so that a name that answers otherwise a moment later gains nothing.
 */
export function guardedLookup(mayLoopBack: boolean) {
  return (host: string, options: { all?: boolean }, answer: Answer): void => {
    const all: LookupAllOptions = { ...options, all: true };
    resolve(host, all, (error, addresses) => {
      if (error) return answer(error, []);
      const [first] = addresses;
      const isRefused = addresses.some(({ address }) => !mayReach(address, mayLoopBack));
      if (!first || isRefused)
        return answer(new Error('The name leads to an address that is not public.'), []);
      if (options.all) answer(null, addresses);
      else answer(null, first.address, first.family);
    });
  };
}
