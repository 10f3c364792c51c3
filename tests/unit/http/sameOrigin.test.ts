import { beforeAll, expect, test } from 'vitest';
import { requireSameOrigin } from '#lib/http/sameOrigin';

beforeAll(() => {
  process.env['BITTERN_DB_PASSWORD'] = 'secret';
  process.env['BITTERN_PERSONAL_DATA_KEY'] = 'ab'.repeat(32);
});

const request = (method: string, headers: Record<string, string>) =>
  new Request('http://127.0.0.1:4321/api/v1/session', { method, headers });

test.each([
  ['a page of another site', { 'sec-fetch-site': 'cross-site', origin: 'https://elsewhere.example' }],
  ['a sibling site', { 'sec-fetch-site': 'same-site', origin: 'http://other.127.0.0.1:4321' }],
  ['an old browser on another site', { origin: 'https://elsewhere.example' }],
  ['a sandboxed frame', { origin: 'null' }],
])('a change sent by %s is refused', (_, headers) => {
  expect(() => requireSameOrigin(request('POST', headers))).toThrow('another site');
  expect(() => requireSameOrigin(request('GET', headers))).not.toThrow();
});

test.each([
  ['an own page', { 'sec-fetch-site': 'same-origin', origin: 'http://127.0.0.1:4321' }],
  ['an old browser on an own page', { origin: 'http://localhost:4321' }],
  ['a program without a browser', {}],
  ['a monitor with its token', { authorization: 'Bearer x', origin: 'https://elsewhere.example' }],
])('a change sent by %s passes', (_, headers) => {
  expect(() => requireSameOrigin(request('POST', headers as Record<string, string>))).not.toThrow();
});
