import { describe, expect, test } from 'vitest';
import { addressKey, RateLimit } from '#lib/http/rateLimit';

describe('a pace', () => {
  test('lets ten seconds’ worth through at once, then the steady pace, and says when to come again', () => {
    const pace = new RateLimit(60);
    for (let at = 0; at < 10; at += 1) expect(pace.take('one', 0)).toBe(0);
    expect(pace.take('one', 0)).toBe(1);
    expect(pace.take('other', 0)).toBe(0);
    expect(pace.take('one', 999)).toBe(1);
    expect(pace.take('one', 1000)).toBe(0);
    expect(pace.take('one', 1000)).toBe(1);
  });

  test('earns no more than ten seconds’ worth by a pause, and loses nothing when the clock goes back', () => {
    const pace = new RateLimit(60);
    expect(pace.take('one', 3_600_000)).toBe(0);
    for (let at = 0; at < 9; at += 1) expect(pace.take('one', 0)).toBe(0);
    expect(pace.take('one', 0)).toBe(1);
  });

  test('slower than one in ten seconds still lets one through', () => {
    const pace = new RateLimit(1);
    expect(pace.take('one', 0)).toBe(0);
    expect(pace.take('one', 0)).toBe(60);
  });
});

test.each([
  ['203.0.113.9', '203.0.113.9'],
  ['::ffff:203.0.113.9', '203.0.113.9'],
  ['2001:db8:1:2:3:4:5:6', '2001:db8:1:2'],
  ['2001:DB8:0001:2::6', '2001:db8:1:2'],
  ['2001:db8::6', '2001:db8:0:0'],
  ['::1', '0:0:0:0'],
  ['', ''],
])('address %s counts as %s', (address, key) => {
  expect(addressKey(address)).toBe(key);
});
