import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { parse } from 'csv-parse/sync';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { roundHalfUp } from '#lib/acoustics/rounding';
import { summarySchema } from '#lib/contracts/summaries';
import { formatLevelDb } from '#lib/format/levels';
import { summaryCsv } from '#lib/services/summaries/summaryCsv';
import { summaryPdf } from '#lib/services/summaries/summaryPdf';
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

describe('PDF', () => {
  const directory = mkdtempSync(join(tmpdir(), 'bittern-summary-'));
  const file = join(directory, 'summary.pdf');
  let pages: string[] = [];

  beforeAll(async () => {
    writeFileSync(file, await summaryPdf(summary));
    pages = execFileSync('pdftotext', ['-layout', file, '-'], { encoding: 'utf8' }).split('\f').slice(0, -1);
  });
  afterAll(() => rmSync(directory, { recursive: true }));

  /** Columns of the table line that begins with `start`. */
  const line = (page: string | undefined, start: string) =>
    page
      ?.split('\n')
      .find((text) => text.trim().startsWith(start))
      ?.trim()
      .slice(start.length)
      .trim()
      .split(/\s{2,}/);

  test('numbers its pages, says that it is a draft and how the figures are made', () => {
    pages.forEach((page, at) => {
      expect(page).toContain(`${at + 1} of ${pages.length}`);
      expect(page).toContain('draft, not issued');
    });
    const all = pages.join(' ').replace(/\s+/g, ' ');
    expect(all).toContain('A night belongs to the date on which it begins');
    expect(all).toContain('zone Europe/London');
    expect(all).toContain('minimum coverage is 75 %');
    expect(all).toContain('competent authority decide');
    expect(all).toContain('Clock change on Sun 29 March 2026: that day has 23 h');
    expect(all).toContain('Coverage 98 %.');
    expect(all).toContain('Complaints about noise that began in this month: 4, of which 3 answered');
  });

  test('embeds Noto Sans and has no missing glyph', () => {
    const fonts = execFileSync('pdffonts', [file], { encoding: 'utf8' }).split('\n').slice(2, -1);
    expect(fonts.length).toBeGreaterThan(1);
    for (const font of fonts) expect(font).toMatch(/\+NotoSans\S* .* yes yes/);
    expect(pages.join('')).not.toContain('\u0000');
    expect(pages.join('')).not.toContain('\uFFFD');
  });

  test('carries the same figures, rounded once to 0.1 dB', () => {
    for (const { code, name, figures, days, bands } of summary.stations) {
      expect(line(pages[0], `${code} ${name}`)?.slice(0, 6)).toEqual(
        [figures.Lday, figures.Levening, figures.Lnight, figures.Lden, figures.LAeq, figures.LAFmax].map(
          formatLevelDb,
        ),
      );
      const at = pages.findIndex((page) => page.trimStart().startsWith(`${code} `));
      const table = pages[at + 1];
      for (const day of days.filter(({ periods }) => periods.whole.meetsMinimum)) {
        expect(line(table, day.date)?.slice(0, 4), day.date).toEqual(
          [day.Lday, day.Levening, day.Lnight, day.Lden].map(formatLevelDb),
        );
      }
      expect(line(table, '2026-03-05')?.join(' ')).toContain(`† ${formatLevelDb(days[4]?.Lnight ?? null)}`);
      const hundred = bands.find(({ nominalHz }) => nominalHz === 100);
      expect(table).toMatch(
        new RegExp(
          `100 Hz\\s+${[hundred?.Leq, hundred?.L10, hundred?.L50, hundred?.L90].map((db) => formatLevelDb(db ?? null)).join('\\s+')}`,
        ),
      );
    }
  });

  test('lists exceedances with limit, level and state', () => {
    const page = pages.find((text) => text.includes('Exceedances') && text.includes('Bands over the month'));
    expect(line(page, '=Night hours, "quiet"')).toEqual(
      expect.arrayContaining(['17 Mar 03:00', '52.3 dB', '50.0 dB', '100 %', 'standing']),
    );
    expect(line(page, 'Tones')).toEqual(expect.arrayContaining(['26.0 %', '20.0 %', 'lifted']));
  });
});

test('a month in progress is labelled “to date” on every page', async () => {
  const directory = mkdtempSync(join(tmpdir(), 'bittern-summary-'));
  const file = join(directory, 'summary.pdf');
  writeFileSync(file, await summaryPdf(summaryOf([summaryStation('MER-01')], { isToDate: true })));
  const pages = execFileSync('pdftotext', [file, '-'], { encoding: 'utf8' }).split('\f').slice(0, -1);
  rmSync(directory, { recursive: true });
  expect(pages.length).toBeGreaterThan(1);
  for (const page of pages) expect(page).toContain('to date');
});
