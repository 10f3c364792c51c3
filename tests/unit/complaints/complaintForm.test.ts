import { describe, expect, test } from 'vitest';
import { COMPLAINT_FIELDS, readComplaint, typedFields } from '#components/complaints/complaintForm.ts';

const typed = (changes: Record<string, string> = {}) =>
  typedFields(
    new URLSearchParams({
      from: '2026-03-17T03:10',
      to: '2026-03-17T03:40',
      kind: 'hum',
      latitude: '54.1031',
      longitude: '−1.6028',
      email: ' ada@wren.example ',
      name: 'Ada Wren',
      ...changes,
    }),
    COMPLAINT_FIELDS,
  );
const NOW_SEC = Date.parse('2026-07-18T09:00:00Z') / 1000;
const at = (instant: string) => Date.parse(instant) / 1000;

describe('what was typed', () => {
  test('is read as local time of the network, with a minus sign as people write it', () => {
    const read = readComplaint(typed(), 'Europe/London', NOW_SEC);
    expect(read).toMatchObject({
      isValid: true,
      complaint: {
        from: at('2026-03-17T03:10:00Z'),
        to: at('2026-03-17T03:40:00Z'),
        latitude: 54.1031,
        longitude: -1.6028,
        station: null,
        contact: { name: 'Ada Wren', email: 'ada@wren.example', phone: null, address: null },
      },
    });
  });

  test('in summer time is an hour earlier in UTC; an offset in a link holds', () => {
    const summer = typed({ from: '2026-07-17T03:10', to: '2026-07-17T02:40:00Z' });
    expect(readComplaint(summer, 'Europe/London', NOW_SEC)).toMatchObject({
      complaint: { from: at('2026-07-17T02:10:00Z'), to: at('2026-07-17T02:40:00Z') },
    });
  });

  test.each([
    [{ from: 'yesterday' }, 'from'],
    [{ to: '' }, 'to'],
    [{ to: '2026-03-17T03:00' }, 'to'],
    [{ kind: '' }, 'kind'],
    [{ latitude: '54,1' }, 'latitude'],
    [{ latitude: '91' }, 'latitude'],
    [{ longitude: '' }, 'longitude'],
    [{ latitude: '', longitude: '' }, 'station'],
    [{ email: 'ada' }, 'email'],
    [{ words: 'x'.repeat(4001) }, 'words'],
  ])('%o is told at its field', (changes, field) => {
    const read = readComplaint(typed(changes), 'Europe/London', NOW_SEC);
    expect(read.isValid).toBe(false);
    expect(Object.keys(read.isValid ? {} : read.errors)).toEqual([field]);
  });
});
