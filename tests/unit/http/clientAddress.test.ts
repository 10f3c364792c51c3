import type { IncomingMessage } from 'node:http';
import { expect, test } from 'vitest';
import { clientAddress } from '#ops/http/clientAddress';

const from = (remoteAddress: string, forwarded?: string) =>
  ({ socket: { remoteAddress }, headers: { 'x-forwarded-for': forwarded } }) as unknown as IncomingMessage;

test.each([
  ['no proxy is believed, whatever is said', 0, '198.51.100.7, 203.0.113.5', '192.0.2.1'],
  ['one proxy tells who came to it', 1, '198.51.100.7, 203.0.113.5', '203.0.113.5'],
  ['two proxies', 2, '198.51.100.7, 203.0.113.5', '198.51.100.7'],
  ['more believed than there are', 3, '198.51.100.7, 203.0.113.5', '198.51.100.7'],
  ['a proxy that says nothing', 1, undefined, '192.0.2.1'],
])('%s', (_, trusted, forwarded, expected) => {
  expect(clientAddress(from('192.0.2.1', forwarded), trusted)).toBe(expected);
});
