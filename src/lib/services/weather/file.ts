import { parse } from 'csv-parse/sync';
import { selectWeather } from '#db/queries/weatherRecords';
import { formatInstantUtc } from '#lib/contracts/common';
import { MOST_WEATHER_RECORDS, type WeatherFileReport } from '#lib/contracts/weather';
import { csvText } from '#lib/format/csvText';
import { type Span } from '../levels/spans';
import { done, invalid, type Outcome } from '../outcome';
import { receiveWeather, type ReceivingMast } from './receive';

const COLUMNS = ['start', 'seconds', 'windSpeed', 'windDirection', 'rain', 'temperature'] as const;
const NEEDED = COLUMNS.slice(0, 3);

/**
 * Takes a CSV file of a mast's records: columns start, seconds, windSpeed and perhaps windDirection, rain, temperature, in any order,
 * times RFC 3339. A line stored before is known; a bad line never costs a good one.
 */
export async function takeWeatherFile(
  mast: ReceivingMast,
  text: string,
  isTrial: boolean,
): Promise<Outcome<WeatherFileReport>> {
  let rows: string[][];
  try {
    const delimiter = [',', ';', '\t'];
    rows = parse(text, {
      bom: true,
      trim: true,
      skip_empty_lines: true,
      relax_column_count: true,
      delimiter,
    });
  } catch {
    return invalid('file', 'could not be read as CSV: a quotation mark may be missing');
  }
  const heading = rows[0] ?? [];
  const missing = NEEDED.filter((name) => !heading.includes(name));
  if (missing.length > 0) return invalid('file', `must have a first line that names ${missing.join(', ')}`);
  if (rows.length > MOST_WEATHER_RECORDS + 1)
    return invalid('file', `must have at most ${MOST_WEATHER_RECORDS} lines`);
  const records = rows.slice(1).map((row) => recordOf(heading, row));
  const { accepted, known, refused } = await receiveWeather(mast, records, new Date(), isTrial);
  return done({
    accepted,
    known,
    isTrial,
    refused: refused.map(({ index, detail }) => ({ line: index + 2, message: detail })),
  });
}

function recordOf(heading: readonly string[], row: readonly string[]): Record<string, unknown> {
  return Object.fromEntries(
    COLUMNS.map((name) => {
      const cell = row[heading.indexOf(name)] ?? '';
      if (name === 'start') return [name, cell];
      return [name, cell === '' ? undefined : Number(cell.replace(',', '.'))];
    }),
  );
}

/** A mast's records that begin in a period as a file that can be brought back. */
export async function weatherCsv(mastId: number, { fromSec, toSec }: Span): Promise<string> {
  const records = await selectWeather(mastId, fromSec, toSec, 0);
  return csvText([
    [...COLUMNS],
    ...records
      .filter(({ startSec }) => startSec >= fromSec)
      .map((record) => [
        formatInstantUtc(record.startSec),
        record.durationSec,
        record.windSpeedMs,
        record.windDirectionDeg,
        record.rainMm,
        record.temperatureC,
      ]),
  ]);
}
