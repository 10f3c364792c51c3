import { parse } from 'csv-parse/sync';
import { describe, expect, test } from 'vitest';
import { roundHalfUp } from '#lib/acoustics/rounding';
import { summarySchema } from '#lib/contracts/summaries';
import { summaryCsv } from '#lib/services/summaries/summaryCsv';
import { summaryOf, summaryStation } from './summaryFixture';

const summary = summaryOf([summaryStation('MER-01'), summaryStation('MER-02', 3.3)]);
type Row = Record<string, string>;

test('the summary is of the contract’s form', () => {
  expect(summarySchema.parse(summary)).toEqual(summary);
});

describe('CSV', () => {
  const text = summaryCsv(summary);
  const rows: Row[] = parse(text, { columns: true });

  test('is RFC 4180 with CRLF and one heading, and says the kind of record first', () => {
    expect(text.startsWith('record,network,month,station,')).toBe(true);
    expect(text.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/);
    expect(new Set(rows.map((row) => row['record']))).toEqual(
      new Set(['month', 'day', 'band', 'exceedance']),
    );
  });

  test('has a row for each figure of the JSON, equal to four decimals', () => {
    for (const station of summary.stations) {
      const own = rows.filter((row) => row['station'] === station.code);
      const value = (record: string, quantity: string, more: Row = {}) => {
        const found = own.filter(
          (row) =>
            row['record'] === record &&
            row['quantity'] === quantity &&
            Object.entries(more).every(([column, text]) => row[column] === text),
        );
        expect(found, `${record} ${quantity} ${JSON.stringify(more)}`).toHaveLength(1);
        return found[0]?.['value'] === '' ? null : Number(found[0]?.['value']);
      };
      const same = (got: number | null, expected: number | null) =>
        expect(got).toBe(expected === null ? null : roundHalfUp(expected, 4));
      for (const name of [
        'Lday',
        'Levening',
        'Lnight',
        'Lden',
        'LAeq',
        'LA10',
        'LA50',
        'LA90',
        'LAFmax',
      ] as const) {
        same(value('month', name), station.figures[name]);
      }
      for (const day of station.days) {
        for (const name of ['Lday', 'Levening', 'Lnight', 'Lden'] as const) {
          same(value('day', name, { date: day.date }), day[name]);
        }
      }
      for (const band of station.bands) {
        for (const name of ['Leq', 'L10', 'L50', 'L90'] as const) {
          same(value('band', name, { band_hz: String(band.nominalHz) }), band[name]);
        }
      }
    }
  });

  test('a level below the minimum coverage says so, and a missing one is empty, never 0', () => {
    const night = rows.find((row) => row['date'] === '2026-03-05' && row['quantity'] === 'Lnight');
    expect(night).toMatchObject({ coverage: '0.4123', meets_minimum: 'false', value: '44.4123' });
    const missing = rows.find((row) => row['date'] === '2026-03-10' && row['quantity'] === 'Lden');
    expect(missing?.['value']).toBe('');
  });

  test('text that a spreadsheet would calculate is escaped, numbers are not', () => {
    const negative = summaryStation('MER-03');
    negative.figures.LA90 = -1.25;
    const escaped: Row[] = parse(summaryCsv(summaryOf([negative])), { columns: true });
    expect(escaped.find((row) => row['record'] === 'exceedance')?.['limit']).toBe(`'=Night hours, "quiet"`);
    expect(escaped.find((row) => row['quantity'] === 'LA90')?.['value']).toBe('-1.25');
  });

  test('an exceedance is in the unit of its limit', () => {
    const rows: Row[] = parse(summaryCsv(summaryOf([summaryStation('MER-01')])), { columns: true });
    const exceedances = rows.filter((row) => row['record'] === 'exceedance');
    expect(exceedances.map((row) => [row['value'], row['unit'], row['threshold']])).toEqual([
      ['52.34', 'dB', '50'],
      ['26.04', '%', '20'],
    ]);
  });
});
