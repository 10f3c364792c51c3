import { describe, expect, test } from 'vitest';
import { type Layout } from '#ingest/imports/layout';
import { readRow } from '#ingest/imports/readRow';
import { type ImportMapping } from '#lib/contracts/imports';
import { LocalInstants, zoneNamed } from '#lib/time/localInstants';

function layout(changes: Partial<ImportMapping> = {}): Layout {
  const mapping: ImportMapping = {
    delimiter: ';',
    decimal: ',',
    headerLine: 1,
    columns: ['start', 'LAeq', '63', 'flags'],
    dateOrder: 'dmy',
    zone: 'Europe/London',
    marks: 'start',
    seconds: 60,
    ...changes,
  };
  const zone = zoneNamed(mapping.zone);
  if (!zone) throw new Error(mapping.zone);
  return {
    mapping,
    places: { start: 0, LAeq: 1, flags: 3 },
    bands: [{ nominalHz: 63, place: 2 }],
    bandSet: { id: 1, fraction: 3, indices: Int8Array.of(-12) },
    instants: new LocalInstants(zone),
  };
}

const startOf = (text: string, changes?: Partial<ImportMapping>) =>
  readRow([text, '50', '', ''], layout(changes)).record['start'];

describe('a row', () => {
  test('becomes the record that a monitor would have sent', () => {
    expect(readRow(['01.07.2026 12:00:00', '51,25', '---', 'rain wind'], layout())).toEqual({
      record: {
        start: '2026-07-01T11:00:00Z',
        seconds: 60,
        LAeq: 51.25,
        levels: [null],
        flags: ['rain', 'wind'],
      },
      refusal: null,
    });
  });

  test('keeps what is no number, for the receiver to refuse', () => {
    expect(readRow(['01.07.2026 12:00', '1.234,5', 'low', ''], layout()).record).toMatchObject({
      LAeq: '1.234,5',
      levels: ['low'],
    });
  });

  test('with more or fewer cells than the heading is told', () => {
    expect(readRow(['01.07.2026 12:00', '50'], layout()).refusal?.detail).toMatch(/2 cells.*4/);
    expect(readRow(['01.07.2026 12:00', '50', '', '', ''], layout()).refusal).toBeNull();
  });
});

describe('a time', () => {
  test.each([
    ['1/7/26 9:05', 'dmy', '2026-07-01T08:05:00Z'],
    ['7/1/2026 09:05:00 PM', 'mdy', '2026-07-01T20:05:00Z'],
    ['2026-07-01T24:00', 'ymd', '2026-07-01T23:00:00Z'],
    ['2026-07-01 12:00:00,000', 'ymd', '2026-07-01T11:00:00Z'],
    ['2026-07-01T12:00:00+05:30', 'dmy', '2026-07-01T06:30:00Z'],
  ] as const)('%s as %s is %s', (text, dateOrder, start) => {
    expect(startOf(text, { dateOrder })).toBe(start);
  });

  test('may name the end', () => {
    expect(startOf('01.01.2026 00:01', { marks: 'end' })).toBe('2026-01-01T00:00:00Z');
  });

  test.each([
    '31.02.2026 12:00',
    '01.13.2026 12:00',
    '01.07.2026',
    'noon',
    '01.07.2026 24:30',
    '01.07.2026 25:00',
  ])('%s is none', (text) => {
    expect(readRow([text, '50', '', ''], layout()).refusal?.reason).toBe('malformed');
  });
});

describe('what the clock on the wall showed', () => {
  const at = (zone: string, wall: string) => {
    const named = zoneNamed(zone);
    return (
      named && new LocalInstants(named).at(Date.parse(`${wall}Z`)).map((ms) => new Date(ms).toISOString())
    );
  };

  test('was once, twice or never', () => {
    expect(at('Europe/London', '2026-10-25T00:59:59')).toEqual(['2026-10-24T23:59:59.000Z']);
    expect(at('Europe/London', '2026-10-25T01:00:00')).toEqual([
      '2026-10-25T00:00:00.000Z',
      '2026-10-25T01:00:00.000Z',
    ]);
    expect(at('Europe/London', '2026-10-25T02:00:00')).toEqual(['2026-10-25T02:00:00.000Z']);
    expect(at('Europe/London', '2026-03-29T01:00:00')).toEqual([]);
    expect(at('Europe/London', '2026-03-29T01:59:59')).toEqual([]);
    expect(at('Europe/London', '2026-03-29T02:00:00')).toEqual(['2026-03-29T01:00:00.000Z']);
    // Half an hour only.
    expect(at('Australia/Lord_Howe', '2026-04-05T01:45:00')).toHaveLength(2);
    expect(at('Australia/Lord_Howe', '2026-04-05T01:15:00')).toHaveLength(1);
  });

  test('by a clock that never changes is never in doubt', () => {
    expect(at('UTC+1', '2026-10-25T01:30:00')).toEqual(['2026-10-25T00:30:00.000Z']);
    expect(at('UTC-03:30', '2026-10-25T01:30:00')).toEqual(['2026-10-25T05:00:00.000Z']);
    expect(zoneNamed('UTC+15')).toBeNull();
    expect(zoneNamed('Mars/Olympus')).toBeNull();
  });
});
