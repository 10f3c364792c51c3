import { afterEach, beforeAll, expect, test, vi } from 'vitest';
import { log } from '#lib/config/log';
import { noteRefusal } from '#lib/http/noteRefusal';

const noted: unknown[] = [];

beforeAll(() => {
  process.env['BITTERN_DB_PASSWORD'] ??= 'unused';
  process.env['BITTERN_PERSONAL_DATA_KEY'] ??= 'ab'.repeat(32);
  const info = vi.spyOn(log(), 'info').mockImplementation((what: unknown) => void noted.push(what));
  return () => info.mockRestore();
});

afterEach(() => void noted.splice(0));

const request = { requestId: 'r-1', method: 'POST', path: '/sign-in', userId: null };

test.each([401, 403, 429])('%i is noted', (status) => {
  noteRefusal(status, request);
  expect(noted).toEqual([{ ...request, status }]);
});

test.each([200, 303, 404, 422])('%i is everyday', (status) => {
  noteRefusal(status, request);
  expect(noted).toEqual([]);
});

test.each(['/report/merrow/', '/join/', '/reset/', '/acknowledge/'])(
  'what is secret in %s is not noted',
  (path) => {
    noteRefusal(403, { ...request, path: `${path}a-secret-key` });
    expect(JSON.stringify(noted)).not.toContain('a-secret-key');
  },
);
