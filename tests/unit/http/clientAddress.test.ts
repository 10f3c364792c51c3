import type { IncomingMessage } from 'node:http';
import { expect, test } from 'vitest';
import { clientAddress, proxyTrust } from '#ops/http/clientAddress';

const from = (remoteAddress: string, forwarded?: string) =>
  ({ socket: { remoteAddress }, headers: { 'x-forwarded-for': forwarded } }) as unknown as IncomingMessage;

test.each([
  ['no proxy is believed, whatever is said', 0, '198.51.100.7, 203.0.113.5', '192.0.2.1'],
  ['one proxy tells who came to it', 1, '198.51.100.7, 203.0.113.5', '203.0.113.5'],
  ['two proxies', 2, '198.51.100.7, 203.0.113.5', '198.51.100.7'],
  ['more believed than there are', 3, '198.51.100.7, 203.0.113.5', '198.51.100.7'],
  ['a proxy that says nothing', 1, undefined, '192.0.2.1'],
])('%s', (_, trusted, forwarded, expected) => {
  expect(clientAddress(from('192.0.2.1', forwarded), proxyTrust(trusted))).toBe(expected);
});

const LISTED = ['192.0.2.1', '10.0.0.0/8', '2001:db8::/32'];

test.each([
  ['a stranger is believed nothing', '203.0.113.5', '198.51.100.7', '203.0.113.5'],
  ['a listed proxy tells who came to it', '192.0.2.1', '198.51.100.7, 203.0.113.5', '203.0.113.5'],
  ['a listed block before it', '192.0.2.1', '198.51.100.7, 203.0.113.5, 10.2.3.4', '203.0.113.5'],
  ['IPv4 in the clothes of IPv6', '::ffff:192.0.2.1', '203.0.113.5', '203.0.113.5'],
  ['IPv6', '2001:db8::9', '203.0.113.5', '203.0.113.5'],
  ['a word that is no address is no proxy', '192.0.2.1', '203.0.113.5, unknown', 'unknown'],
  ['only listed ones', '192.0.2.1', '10.9.9.9', '10.9.9.9'],
])('by addresses: %s', (_, remote, forwarded, expected) => {
  expect(clientAddress(from(remote, forwarded), proxyTrust(LISTED))).toBe(expected);
});
