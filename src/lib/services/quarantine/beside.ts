import { pool } from '#db/queries/connection';
import { selectIntervals, type StoredInterval } from '#db/queries/intervals';
import { bandAt } from '#lib/acoustics/bands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { flagNames } from '#lib/acoustics/validity';
import { parseInstant } from '#lib/contracts/common';
import { type QuarantinedRecord } from '#lib/contracts/quarantine';
import { inDb } from '../intervals/columns';

/** One field of a refused record beside the same field of the stored interval. Texts as they are; null: not there. */
export interface FieldBeside {
  name: string;
  unit: string;
  sent: string | null;
  stored: string | null;
  differs: boolean;
}

const SCALARS = [
  ['seconds', 's', (interval: StoredInterval) => interval.durationSec],
  ['LAeq', 'dB', (interval: StoredInterval) => interval.laeqCentiDb / 100],
  ['LAFmax', 'dB', (interval: StoredInterval) => inDb(interval.lafmaxCentiDb)],
  ['LAFmin', 'dB', (interval: StoredInterval) => inDb(interval.lafminCentiDb)],
  ['LCeq', 'dB', (interval: StoredInterval) => inDb(interval.lceqCentiDb)],
  ['LCpeak', 'dB', (interval: StoredInterval) => inDb(interval.lcpeakCentiDb)],
  ['windSpeed', 'm/s', (interval: StoredInterval) => interval.windSpeedMs],
  ['windDirection', '°', (interval: StoredInterval) => interval.windDirectionDeg],
  ['temperature', '°C', (interval: StoredInterval) => interval.temperatureC],
  ['battery', 'V', (interval: StoredInterval) => interval.batteryV],
] as const;

/** The interval that is stored for the start that a record claims; null where there is none. */
export async function storedFor(stationId: number, start: string | null): Promise<StoredInterval | null> {
  const startSec = start === null ? null : parseInstant(start);
  if (startSec === null) return null;
  const around = await selectIntervals(stationId, startSec, startSec + 1, pool());
  return around.find((interval) => interval.startSec === startSec) ?? null;
}

/** The fields of a record that has any, beside those of the stored interval; empty when it is no object. */
export function fieldsBeside(
  { bands, interval }: QuarantinedRecord['record'],
  stored: StoredInterval | null,
): FieldBeside[] {
  if (typeof interval !== 'object' || interval === null || Array.isArray(interval)) return [];
  const fields = interval as Record<string, unknown>;
  const levels: unknown[] = Array.isArray(fields['levels']) ? fields['levels'] : [];
  const rows = [
    ...SCALARS.map(([name, unit, of]) => row(name, unit, fields[name], stored && of(stored))),
    row('flags', '', listText(fields['flags']), stored && flagNames(stored.flags).join(' ')),
    ...bands.map((hz, at) => row(`${hz} Hz`, 'dB', levels[at], stored && bandLevel(stored, hz))),
  ];
  return rows.filter(({ sent, stored: kept }) => sent !== null || kept !== null);
}

function row(name: string, unit: string, sent: unknown, stored: string | number | null): FieldBeside {
  const [sentText, storedText] = [textOf(sent), textOf(stored)];
  const bothThere = sentText !== null && storedText !== null;
  return { name, unit, sent: sentText, stored: storedText, differs: bothThere && sentText !== storedText };
}

function textOf(value: unknown): string | null {
  if (value === null || value === undefined || value === '') return null;
  return typeof value === 'string' ? value : JSON.stringify(value);
}

function listText(value: unknown): unknown {
  return Array.isArray(value) ? value.map(String).join(' ') : value;
}

function bandLevel({ bandFraction, bandIndices, levelsCentiDb }: StoredInterval, hz: number): number | null {
  const at = bandIndices.findIndex((index) => bandAt(bandFraction, index).nominalHz === hz);
  const level = levelsCentiDb[at];
  return level === undefined || level === NO_LEVEL_CENTI_DB ? null : level / 100;
}
