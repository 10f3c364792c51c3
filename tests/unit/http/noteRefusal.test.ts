import { afterEach, expect, test, vi } from 'vitest';

const noted = vi.hoisted(() => [] as Record<string, unknown>[]);
vi.mock('#lib/config/log', () => ({
  log: () => ({ info: (what: Record<string, unknown>) => noted.push(what) }),
}));

const { noteRefusal } = await import('#lib/http/noteRefusal');

afterEach(() => noted.splice(0));

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
