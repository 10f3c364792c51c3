import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import ExcelJS from 'exceljs';
import { strFromU8, unzipSync } from 'fflate';
import Papa from 'papaparse';
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest';
import { monthDocumentSchema } from '#lib/contracts/monthDocument';
import { openApiDocument } from '#lib/contracts/openapi';
import { DEFAULT_SUMMARY_TEMPLATE } from '#lib/contracts/summaryTemplate';
import { formatLevelDb } from '#lib/format/levels';
import { FILE_FORMATS, renderFile, type RenderContext } from '#lib/services/summaries/document/render';
import { documentOf, documentStation, silentStation } from './documentFixture';

// Fonts are read and cut down; a busy machine takes its time for that.
vi.setConfig({ testTimeout: 60_000, hookTimeout: 60_000 });

const doc = documentOf([documentStation('MER-01', 1), documentStation('MER-02', 2), silentStation('MER-03')]);
const context: RenderContext = {
  template: DEFAULT_SUMMARY_TEMPLATE,
  revision: 2,
  issuedBy: { name: 'Ada Fenn', at: '2026-04-09T08:00:00Z' },
  seal: {
    dataSha256: 'ab'.repeat(32),
    yearSha256: 'cd'.repeat(32),
    softwareVersion: '0.1.0',
    publicKey: null,
  },
  chainHead: { position: 4711, sha256: 'cd'.repeat(32) },
  verifyUrl: 'https://merrow.example/verify',
};

type Row = Record<string, string>;
let files: Map<string, Uint8Array>;
let tables: Map<string, Row[]>;

beforeAll(async () => {
  const made = await Promise.all(FILE_FORMATS.map((format) => renderFile(doc, context, format)));
  files = new Map(made.map(({ name, bytes }) => [name, bytes]));
  tables = tablesOf(file('merrow-2026-03-r2.csv.zip'));
});

function file(name: string): Uint8Array {
  const bytes = files.get(name);
  if (!bytes) throw new Error(`There is no ${name} among ${[...files.keys()].join(', ')}.`);
  return bytes;
}

/** Every table of the zip, read by another library than what wrote it. */
function tablesOf(zip: Uint8Array): Map<string, Row[]> {
  const found = new Map<string, Row[]>();
  for (const [name, bytes] of Object.entries(unzipSync(zip))) {
    if (!name.endsWith('.csv')) continue;
    const { data, errors } = Papa.parse<Row>(strFromU8(bytes), { header: true, skipEmptyLines: true });
    expect(errors, name).toEqual([]);
    found.set(name.replace('.csv', ''), data);
  }
  return found;
}

/** First line of a table’s file. */
const headsOf = (table: string): string =>
  strFromU8(unzipSync(file('merrow-2026-03-r2.csv.zip'))[`${table}.csv`] ?? new Uint8Array()).split(
    '\r\n',
  )[0] ?? '';

const rowsOf = (table: string, match: Row): Row[] =>
  (tables.get(table) ?? []).filter((row) =>
    Object.entries(match).every(([key, value]) => row[key] === value),
  );

/** The one row of a table that matches. */
function rowOf(table: string, match: Row): Row {
  const [row, ...others] = rowsOf(table, match);
  expect(others, `${table} ${JSON.stringify(match)}`).toEqual([]);
  if (!row) throw new Error(`${table} has no ${JSON.stringify(match)}.`);
  return row;
}

const cell = (value: number | null | undefined) =>
  value === null || value === undefined ? '' : String(value);

test('the JSON is the document, of its published form', () => {
  const read: unknown = JSON.parse(Buffer.from(file('merrow-2026-03-r2.json')).toString('utf8'));
  expect(monthDocumentSchema.parse(read)).toEqual(doc);
});

test('the interface publishes the form of the JSON', () => {
  const published = JSON.stringify(openApiDocument('https://merrow.example'));
  const { components } = JSON.parse(published) as {
    components: { schemas: Record<string, { required: string[] }> };
  };
  expect(components.schemas['MonthDocument']?.required.sort()).toEqual(Object.keys(doc).sort());
});

describe('CSV', () => {
  test('every figure of the JSON stands in its row, unrounded', () => {
    for (const station of doc.stations) {
      const { code: of, figures, yearToDate } = station;
      const month = (quantity: string) => rowOf('month', { station: of, quantity });
      for (const key of [
        'LAeq',
        'LCeq',
        'LAFmax',
        'LAFmin',
        'LCpeak',
        'LA1',
        'LA5',
        'LA10',
        'LA50',
        'LA90',
        'LA95',
        'LA99',
        'Lday',
        'Levening',
        'Lnight',
        'Lden',
      ] as const) {
        expect(month(key)['level_db'], `${of} ${key}`).toBe(cell(figures[key]));
        if (key in figures.U) {
          expect(month(key)['expanded_uncertainty_db']).toBe(cell(figures.U[key as keyof typeof figures.U]));
        }
      }
      expect(month('LAeq')['coverage']).toBe(cell(figures.coverage));
      const year = rowOf('year_to_date', { station: of });
      for (const key of [
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
        expect(year[`${key}_db`], `${of} year ${key}`).toBe(cell(yearToDate[key]));
      }
      for (const key of ['Lday', 'Levening', 'Lnight', 'Lden', 'LAeq'] as const) {
        expect(year[`${key}_U_db`], `${of} year ${key} U`).toBe(cell(yearToDate.U?.[key] ?? null));
      }
      for (const day of station.days) {
        const row = rowOf('days', { station: of, date: day.date });
        for (const key of ['Lday', 'Levening', 'Lnight', 'Lden'] as const) {
          expect(row[`${key}_db`], `${of} ${day.date} ${key}`).toBe(cell(day[key]));
          expect(row[`${key}_U_db`]).toBe(cell(day.U[key]));
        }
        for (const key of ['LAeq24h', 'LAFmax', 'LA10', 'LA50', 'LA90'] as const) {
          expect(row[`${key}_db`], `${of} ${day.date} ${key}`).toBe(cell(day[key]));
        }
        expect([row['coverage'], row['valid_seconds']]).toEqual([
          cell(day.coverage),
          cell(day.seconds.valid),
        ]);
      }
      expect(rowsOf('hours', { station: of }).map((row) => row['LAeq_db'])).toEqual(
        station.hours.map(({ LAeq }) => cell(LAeq)),
      );
      for (const [fraction, bands] of [
        ['third', station.bands],
        ['octave', station.octaves],
      ] as const) {
        for (const band of bands) {
          const row = rowOf('bands', { station: of, fraction, nominal_hz: String(band.nominalHz) });
          const read = ['Leq_db', 'L10_db', 'L50_db', 'L90_db'].map((key) => row[key]);
          expect(read).toEqual([band.Leq, band.L10, band.L50, band.L90].map(cell));
        }
      }
    }
  });

  test('no number of a station is left out, whatever part it is of', () => {
    for (const station of doc.stations) {
      const own = new Set(
        [...tables.values()].flatMap((rows) =>
          rows.filter((row) => row['station'] === station.code).flatMap((row) => Object.values(row)),
        ),
      );
      for (const number of numbersOf(station, NOT_IN_TABLES)) {
        expect(own, `${station.code} ${number}`).toContain(String(number));
      }
    }
    for (const number of Object.values(doc.complaints)) {
      expect((tables.get('complaints') ?? []).map((row) => row['complaints'])).toContain(String(number));
    }
  });

  test('a station without data has rows whose levels are empty, never 0', () => {
    expect(rowOf('month', { station: 'MER-03', quantity: 'Lden' })).toMatchObject({
      level_db: '',
      coverage: '0',
    });
    expect(rowsOf('days', { station: 'MER-03' })).toHaveLength(31);
  });

  test('text that a spreadsheet would calculate is escaped, a negative level is not', () => {
    expect(rowOf('exclusions', { station: 'MER-01' })['reason']).toBe(`'=cmd|crane, "loading"`);
    const negative = doc.stations[0]?.bands[0]?.L90 ?? 0;
    expect(negative).toBeLessThan(0);
    const third = rowsOf('bands', { station: 'MER-01', fraction: 'third' })[0];
    expect(third?.['L90_db']).toBe(String(negative));
  });

  test('its description names every file and column in order, with types and keys that hold', () => {
    const zip = unzipSync(file('merrow-2026-03-r2.csv.zip'));
    interface Described {
      url: string;
      tableSchema: { columns: { name: string; datatype: string }[]; primaryKey: string[] };
    }
    const metadata = JSON.parse(strFromU8(zip['csv-metadata.json'] ?? new Uint8Array())) as {
      '@context': unknown;
      tables: Described[];
    };
    expect(metadata['@context']).toEqual(['http://www.w3.org/ns/csvw', { '@language': 'en' }]);
    expect(metadata.tables.map(({ url }) => url).sort()).toEqual(
      Object.keys(zip)
        .filter((name) => name.endsWith('.csv'))
        .sort(),
    );
    for (const { url, tableSchema } of metadata.tables) {
      const text = strFromU8(zip[url] ?? new Uint8Array());
      expect(text.split('\r\n')[0]).toBe(tableSchema.columns.map(({ name }) => name).join(','));
      expect(text.replaceAll('\r\n', ''), url).not.toMatch(/[\r\n]/);
      const rows = tables.get(url.replace('.csv', '')) ?? [];
      const keys = rows.map((row) => tableSchema.primaryKey.map((key) => row[key]).join('|'));
      // Exceedances of the two stations of the fixture have the same numbers.
      if (url !== 'exceedances.csv') expect(new Set(keys).size, url).toBe(keys.length);
      for (const { name, datatype } of tableSchema.columns) {
        const cells = rows.map((row) => row[name] ?? '').filter((text) => text !== '');
        if (datatype === 'double')
          expect(
            cells.filter((text) => !Number.isFinite(Number(text))),
            `${url} ${name}`,
          ).toEqual([]);
        if (datatype === 'integer')
          expect(
            cells.filter((text) => !/^-?\d+$/.test(text)),
            `${url} ${name}`,
          ).toEqual([]);
      }
    }
  });
});

describe('XLSX', () => {
  test('has a sheet a topic whose typed cells are those of the CSV', async () => {
    const workbook = new ExcelJS.Workbook();
    await workbook.xlsx.load(Buffer.from(file('merrow-2026-03-r2.xlsx')) as unknown as ArrayBuffer);
    const sheets = workbook.worksheets.filter(({ name }) => name !== 'About' && name !== 'Columns');
    expect(sheets).toHaveLength(tables.size);
    const names = [...tables.keys()];
    for (const sheet of sheets) {
      const [heads, ...rows] = cellsOf(sheet);
      const name = names.find((one) => headsOf(one) === (heads ?? []).join(','));
      const wanted = name === undefined ? undefined : tables.get(name);
      expect(wanted, sheet.name).toBeDefined();
      expect(rows, sheet.name).toHaveLength(wanted?.length ?? -1);
      rows.forEach((row, at) => {
        const csv = Object.values(wanted?.[at] ?? {});
        expect(
          csv.map((_, column) => textOf(row[column])),
          `${sheet.name} ${at}`,
        ).toEqual(csv.map(plain));
      });
    }
    const days = workbook.getWorksheet('Days');
    expect(days?.getCell('B2').value).toEqual(new Date('2026-03-01T00:00:00Z'));
    expect(typeof days?.getCell('D2').value).toBe('number');
    const about = cellsOf(workbook.getWorksheet('About') as ExcelJS.Worksheet).map((row) => row.join(' '));
    expect(about).toContain('state issued, revision 2');
    expect(about.join('\n')).toContain('ab'.repeat(32));
  });
});

describe('PDF', () => {
  const directory = mkdtempSync(join(tmpdir(), 'bittern-document-'));
  const path = join(directory, 'month.pdf');
  let pages: string[] = [];

  beforeAll(() => {
    writeFileSync(path, file('merrow-2026-03-r2.pdf'));
    pages = pagesOf(path);
  });
  afterAll(() => rmSync(directory, { recursive: true }));

  test('carries the same figures, rounded once to 0.1 dB', () => {
    for (const station of doc.stations.slice(0, 2)) {
      const own = pagesOfStation(pages, station.code);
      const { figures, yearToDate } = station;
      for (const day of station.days) {
        const levels = [
          day.Lday,
          day.Levening,
          day.Lnight,
          day.Lden,
          day.LAeq24h,
          day.LA10,
          day.LA50,
          day.LA90,
          day.LAFmax,
        ];
        expect(levelsIn(dayLine(own, day.date)).slice(0, 10), day.date).toEqual(
          [...levels, day.U.Lden].map(formatLevelDb),
        );
      }
      for (const band of station.bands) {
        const name = band.nominalHz >= 1000 ? `${band.nominalHz / 1000} kHz` : `${band.nominalHz} Hz`;
        const lines = own.split('\n').filter((one) => one.trim().startsWith(`${name} `));
        const wanted = [band.Leq, band.L10, band.L50, band.L90].map(formatLevelDb);
        expect(
          lines.map((one) => levelsIn(one.trim().slice(name.length)).slice(0, 4)),
          name,
        ).toContainEqual(wanted);
      }
      for (const octave of station.octaves) {
        for (const db of [octave.Leq, octave.L10, octave.L50, octave.L90])
          expect(own).toContain(formatLevelDb(db));
      }
      const row = (over: string) => levelsIn(own.split('\n').find((text) => text.includes(over)) ?? '');
      expect(row(' days ')).toEqual(
        [figures.Lday, figures.U.Lday, yearToDate.Lday, yearToDate.U?.Lday ?? null].map(formatLevelDb),
      );
      expect(row(' nights ')).toEqual(
        [figures.Lnight, figures.U.Lnight, yearToDate.Lnight, yearToDate.U?.Lnight ?? null].map(
          formatLevelDb,
        ),
      );
      expect(row('pooled days')).toEqual(
        [figures.Lden, figures.U.Lden, yearToDate.Lden, yearToDate.U?.Lden ?? null].map(formatLevelDb),
      );
      for (const { all, difference } of station.exclusions.figures) {
        expect(own).toContain(formatLevelDb(all));
        expect(own).toContain(formatLevelDb(difference));
      }
    }
  });

  test('marks what is below the minimum, and tells of a station without data', () => {
    const own = pagesOfStation(pages, 'MER-01');
    const short = doc.stations[0]?.days[4];
    expect(dayLine(own, '2026-03-05')).toContain(`† ${formatLevelDb(short?.Lnight ?? null)}`);
    expect(pagesOfStation(pages, 'MER-03')).toContain('No valid data of this station are on record');
  });

  test('says who issued it, how the figures are made, and what the seal is', () => {
    const all = pages.join(' ').replace(/\s+/g, ' ');
    expect(all).toContain('Issued by Ada Fenn, Thu 9 April 2026, 09:00 BST.');
    expect(all).toContain('A night belongs to the date on which it begins');
    expect(all).toContain('The clock changes on 29 March 2026; that date has 23 hours');
    expect(all).toContain('ab'.repeat(32));
    expect(all).toContain(`4711, ${'cd'.repeat(32)}`);
    expect(all).toContain('of which 3 answered');
    pages.forEach((page, at) => {
      expect(page).toContain(`${at + 1} of ${pages.length}`);
      expect(page).toContain('Revision 2');
    });
  });

  test('embeds Noto Sans, misses no glyph, is tagged and has a bookmark a station', () => {
    const fonts = execFileSync('pdffonts', [path], { encoding: 'utf8' }).split('\n').slice(2, -1);
    expect(fonts.length).toBeGreaterThan(1);
    for (const font of fonts) expect(font).toMatch(/\+NotoSans\S* .* yes yes/);
    expect(pages.join('')).not.toMatch(/[\u0000\uFFFD]/);
    const info = execFileSync('pdfinfo', [path], { encoding: 'utf8' });
    expect(info).toMatch(/Tagged:\s+yes/);
    expect(info).toMatch(/Page size:\s+595\.28 x 841\.89/);
    const structure = execFileSync('pdfinfo', ['-struct', path], { encoding: 'utf8', maxBuffer: 64e6 });
    for (const tag of ['H1', 'H2', 'H3', 'Table', 'TR', 'TH', 'TD', 'Figure']) {
      expect(structure, tag).toMatch(new RegExp(`^\\s*${tag}\\b`, 'm'));
    }
    const raw = Buffer.from(file('merrow-2026-03-r2.pdf')).toString('latin1');
    for (const { code } of doc.stations) expect(raw).toContain(`/Title (${code} `);
  });

  test('has contents with the page on which each part begins, also where pages are not held', async () => {
    const many = Array.from({ length: 47 }, (_, at) => documentStation(`MER-${at + 10}`, at));
    const template = { ...context.template, sections: [], metrics: ['Lden' as const] };
    const pdf = await renderFile(documentOf(many), { ...context, template }, 'pdf');
    writeFileSync(join(directory, 'many.pdf'), pdf.bytes);
    for (const [shown, stations] of [
      [pages, doc.stations],
      [pagesOf(join(directory, 'many.pdf')), many],
    ] as const) {
      const contents = shown.filter((page) => /\d\n/.test(page)).join('\n');
      for (const { code, name } of stations) {
        const begins = shown.findIndex((page) => page.trimStart().startsWith(`${code} ${name}\n`));
        expect(contents, code).toMatch(new RegExp(`^\\s*${code} ${name}\\s+${begins + 1}$`, 'm'));
      }
      const method = shown.findIndex((page) => page.trimStart().startsWith('How these figures are made\n'));
      expect(contents).toMatch(new RegExp(`^\\s*How these figures are made\\s+${method + 1}$`, 'm'));
    }
    const raw = execFileSync('pdfinfo', ['-struct', path], { encoding: 'utf8', maxBuffer: 64e6 });
    expect(raw.match(/^\s*TOCI\b/gm)).toHaveLength(doc.stations.length + 1);
  });

  test('a month in progress says so, and that it is a draft, on every page', async () => {
    const running = { ...documentOf([documentStation('MER-01')]), isToDate: true };
    const pdf = await renderFile(running, { ...context, revision: null, issuedBy: null }, 'pdf');
    writeFileSync(path, pdf.bytes);
    const shown = pagesOf(path);
    expect(shown.length).toBeGreaterThan(1);
    for (const page of shown) {
      expect(page).toContain('to date');
      expect(page).toContain('Draft, not issued');
    }
  });

  test('every character of both languages has a glyph', async () => {
    for (const language of ['en', 'de'] as const) {
      const pdf = await renderFile(
        { ...doc, isToDate: true },
        { ...context, revision: null, issuedBy: null, template: { ...context.template, language } },
        'pdf',
      );
      writeFileSync(path, pdf.bytes);
      const text = pagesOf(path).join(' ').replace(/\s+/g, ' ');
      expect(text).not.toMatch(/[\u0000\uFFFD]/);
      expect(text).toContain(language === 'de' ? 'Entwurf, nicht herausgegeben' : 'Draft, not issued');
      if (language === 'de')
        expect(text).toContain(formatLevelDb(doc.stations[0]?.figures.Lden).replace('.', ','));
    }
  });

  test('shows what the template chose, and nothing else', async () => {
    const template = {
      ...context.template,
      sections: ['days' as const],
      metrics: ['Lden' as const],
      introduction: 'Made for the district.',
    };
    const pdf = await renderFile(documentOf([documentStation('MER-01')]), { ...context, template }, 'pdf');
    writeFileSync(path, pdf.bytes);
    const text = pagesOf(path).join('\n');
    expect(text).toContain('Made for the district.');
    expect(text).toContain('Day by day');
    for (const heading of ['Bands over the month', 'Glossary', 'Complaints', 'Weather']) {
      expect(text).not.toContain(heading);
    }
    expect(text).toContain('How these figures are made');
    expect(
      line(text, '2026-03-01')
        .trim()
        .split(/\s{2,}/),
    ).toHaveLength(3);
  });
});

function pagesOf(path: string): string[] {
  return execFileSync('pdftotext', ['-layout', path, '-'], { encoding: 'utf8', maxBuffer: 64e6 })
    .split('\f')
    .slice(0, -1);
}

function pagesOfStation(pages: readonly string[], code: string): string {
  const first = pages.findIndex((page) => page.trimStart().startsWith(`${code} `));
  const after = pages.findIndex(
    (page, at) => at > first && /^(MER-\d\d |How these figures)/.test(page.trimStart()),
  );
  return pages.slice(first, after).join('\n');
}

const line = (text: string, start: string) =>
  text
    .split('\n')
    .find((one) => one.trim().startsWith(start))
    ?.trim()
    .slice(start.length) ?? '';

/** The line of a date in the table of days: no time of day follows the date. */
const dayLine = (text: string, date: string) =>
  text.split('\n').find((one) => new RegExp(`^\\s*${date}\\s{2,}`).test(one)) ?? '';

/** Levels of a line, marks left out; a dash stands for none. */
const levelsIn = (text: string) => text.match(/(?<![\d.])−?\d+\.\d(?!\d)|—/g) ?? [];

/** Parts of a station that no table holds: the picture, what the placements correct, and numbers that only name. */
const NOT_IN_TABLES = new Set(['spectrogram', 'placements', 'blockSeconds', 'id']);

function* numbersOf(value: unknown, leftOut: ReadonlySet<string>): Generator<number> {
  if (typeof value === 'number') yield value;
  else if (typeof value === 'object' && value !== null) {
    for (const [key, inner] of Object.entries(value)) if (!leftOut.has(key)) yield* numbersOf(inner, leftOut);
  }
}

function cellsOf(sheet: ExcelJS.Worksheet): (ExcelJS.CellValue | undefined)[][] {
  const rows: (ExcelJS.CellValue | undefined)[][] = [];
  sheet.eachRow({ includeEmpty: true }, (row) => rows.push((row.values as ExcelJS.CellValue[]).slice(1)));
  return rows;
}

/** A cell of the workbook as the CSV has it. */
function textOf(value: ExcelJS.CellValue | undefined): string {
  if (value === null || value === undefined) return '';
  if (value instanceof Date) {
    const text = value.toISOString();
    return text.endsWith('T00:00:00.000Z') ? text.slice(0, 10) : text.replace('.000Z', 'Z');
  }
  return typeof value === 'object' ? JSON.stringify(value) : String(value);
}

/** A cell of the CSV without what only the CSV has: the apostrophe, and a midnight’s or a second’s zeros. */
function plain(text: string): string {
  return text
    .replace(/^'(?=[=+\-@])/, '')
    .replace(/\.000Z$/, 'Z')
    .replace(/T00:00:00Z$/, '');
}
