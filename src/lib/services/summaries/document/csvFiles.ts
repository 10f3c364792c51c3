import { strToU8, zipSync, type Zippable } from 'fflate';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import { csvText } from '#lib/format/csvText';
import { type ColumnType, type TopicTable } from './tables/table';

/** Datatypes of CSV on the Web. */
const DATATYPES: Record<ColumnType, string> = {
  text: 'string',
  number: 'double',
  integer: 'integer',
  boolean: 'boolean',
  instant: 'dateTime',
  date: 'date',
};

/**
 * The topics of a month as a zip: a CSV file (RFC 4180, UTF-8) each, and `csv-metadata.json`, which describes their columns as
 * CSV on the Web (W3C). Numbers are those of the JSON, unrounded.
 */
export function csvZip(doc: MonthDocument, tables: readonly TopicTable[]): Uint8Array {
  // The same month gives the same bytes.
  const mtime = new Date(doc.generatedAt);
  const files: Zippable = {
    'csv-metadata.json': [strToU8(`${JSON.stringify(metadataOf(doc, tables), null, 2)}\n`), { mtime }],
  };
  for (const table of tables) {
    const names = table.columns.map(({ name }) => name);
    files[`${table.name}.csv`] = [strToU8(csvText([names, ...table.rows])), { mtime }];
  }
  return zipSync(files, { level: 6 });
}

function metadataOf(doc: MonthDocument, tables: readonly TopicTable[]): object {
  return {
    '@context': ['http://www.w3.org/ns/csvw', { '@language': 'en' }],
    'dc:title': `${doc.network.name}, noise in ${doc.month}`,
    'dc:created': doc.generatedAt,
    'dc:description':
      'Levels in dB re 20 µPa, unrounded; times in UTC, dates local. Text that a spreadsheet would take for a formula has an apostrophe before it.',
    dialect: { encoding: 'utf-8', lineTerminators: ['\r\n'], header: true },
    tables: tables.map((table) => ({
      url: `${table.name}.csv`,
      'dc:title': table.title,
      'dc:description': table.description,
      tableSchema: {
        columns: table.columns.map(({ name, type, unit, description }) => ({
          name,
          titles: name,
          datatype: DATATYPES[type],
          'dc:description': description,
          ...(unit === null ? {} : { 'schema:unitText': unit }),
          ...(table.key.includes(name) ? {} : { null: '' }),
        })),
        primaryKey: table.key,
      },
    })),
  };
}
