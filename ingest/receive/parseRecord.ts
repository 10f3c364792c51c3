import type { BandFraction } from '#lib/acoustics/bands';
import { laeqFromBandsDb } from '#lib/acoustics/laeqFromBands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { toCentiDb } from '#lib/acoustics/rounding';
import { flagMask, FLAGS, isFlagName, type FlagName } from '#lib/acoustics/validity';
import { parseInstant } from '#lib/contracts/common';
import { BOUNDS, type RefusalCode } from '#lib/contracts/intervals';

/** A record as it would be stored. What the monitor left out is null, and is not compared with a stored one. */
export interface ParsedInterval {
  startSec: number;
  durationSec: number;
  laeqCentiDb: number;
  lafmaxCentiDb: number | null;
  lafminCentiDb: number | null;
  lceqCentiDb: number | null;
  lcpeakCentiDb: number | null;
  levelsCentiDb: Int16Array;
  /** Null: left out. */
  flags: number | null;
  isLaeqComputed: boolean;
  windSpeedMs: number | null;
  windDirectionDeg: number | null;
  temperatureC: number | null;
  batteryV: number | null;
}

/** Why a record is not taken. */
export class Refusal extends Error {
  constructor(
    readonly code: RefusalCode,
    readonly detail: string,
  ) {
    super(detail);
    this.name = 'Refusal';
  }
}

export interface BandLayout {
  fraction: BandFraction;
  indices: Int8Array;
}

type Fields = Record<string, unknown>;

/** Reads one record of a post. @throws {Refusal} malformed or out-of-range. */
export function parseRecord(record: unknown, bands: BandLayout): ParsedInterval {
  if (typeof record !== 'object' || record === null || Array.isArray(record)) {
    throw new Refusal('malformed', 'The record is not an object.');
  }
  const fields = record as Fields;
  const startSec = startOf(fields);
  const durationSec = durationOf(fields);
  const levelsCentiDb = levelsOf(fields, bands.indices.length);
  const givenCentiDb = levelOf(fields, 'LAeq');
  return {
    startSec,
    durationSec,
    laeqCentiDb: givenCentiDb ?? computedLaeq(levelsCentiDb, bands),
    isLaeqComputed: givenCentiDb === null,
    lafmaxCentiDb: levelOf(fields, 'LAFmax'),
    lafminCentiDb: levelOf(fields, 'LAFmin'),
    lceqCentiDb: levelOf(fields, 'LCeq'),
    lcpeakCentiDb: levelOf(fields, 'LCpeak'),
    levelsCentiDb,
    flags: flagsOf(fields),
    windSpeedMs: hundredthsOf(fields, 'windSpeed'),
    windDirectionDeg: directionOf(fields),
    temperatureC: hundredthsOf(fields, 'temperature'),
    batteryV: hundredthsOf(fields, 'battery'),
  };
}

function startOf(fields: Fields): number {
  const { start } = fields;
  const startSec = typeof start === 'string' ? parseInstant(start) : null;
  if (startSec === null) throw new Refusal('malformed', '`start` is missing or is not an RFC 3339 time.');
  if (!Number.isInteger(startSec)) throw new Refusal('malformed', '`start` must be a whole second.');
  if (startSec < 0) throw new Refusal('out-of-range', '`start` is before 1970.');
  return startSec;
}

function durationOf({ seconds }: Fields): number {
  const [shortest, longest] = BOUNDS.seconds;
  if (typeof seconds !== 'number' || !Number.isInteger(seconds) || seconds < shortest || seconds > longest) {
    throw new Refusal('malformed', `\`seconds\` must be a whole number from ${shortest} to ${longest}.`);
  }
  return seconds;
}

function levelOf(fields: Fields, name: string): number | null {
  const level = numberOf(fields, name);
  if (level === null) return null;
  requireWithin(name, level, BOUNDS.level);
  return toCentiDb(level);
}

function levelsOf({ levels }: Fields, bandCount: number): Int16Array {
  const stored = new Int16Array(bandCount).fill(NO_LEVEL_CENTI_DB);
  if (levels === undefined || levels === null) return stored;
  if (!Array.isArray(levels)) throw new Refusal('malformed', '`levels` is not a list.');
  if (levels.length !== bandCount) {
    throw new Refusal('malformed', `\`levels\` has ${levels.length} values for ${bandCount} bands.`);
  }
  for (let at = 0; at < bandCount; at += 1) {
    const level: unknown = levels[at];
    if (level === null) continue;
    if (typeof level !== 'number' || !Number.isFinite(level)) {
      throw new Refusal('malformed', `\`levels\` ${at + 1} is not a number or null.`);
    }
    requireWithin('levels', level, BOUNDS.level);
    stored[at] = toCentiDb(level);
  }
  return stored;
}

function computedLaeq(levelsCentiDb: Int16Array, bands: BandLayout): number {
  const laeqDb = laeqFromBandsDb(bands.fraction, levelsCentiDb, bands.indices);
  if (laeqDb === null) {
    throw new Refusal(
      'malformed',
      '`LAeq` is missing, and the bands do not cover the range that it could be computed from.',
    );
  }
  requireWithin('LAeq computed from the bands', laeqDb, BOUNDS.level);
  return toCentiDb(laeqDb);
}

function flagsOf({ flags }: Fields): number | null {
  if (flags === undefined || flags === null) return null;
  if (!Array.isArray(flags)) throw new Refusal('malformed', '`flags` is not a list.');
  const unknown = flags.find((flag) => typeof flag !== 'string' || !isFlagName(flag));
  if (unknown !== undefined) {
    throw new Refusal('malformed', `${shown(unknown)} is not a flag that Bittern knows.`);
  }
  return flagMask(flags as FlagName[]);
}

function shown(value: unknown): string {
  return typeof value === 'string' ? JSON.stringify(value.slice(0, 40)) : 'What is not text';
}

function directionOf(fields: Fields): number | null {
  const degrees = numberOf(fields, 'windDirection');
  if (degrees === null) return null;
  requireWithin('windDirection', degrees, BOUNDS.windDirection);
  return Math.round(degrees) % 360;
}

function hundredthsOf(fields: Fields, name: 'windSpeed' | 'temperature' | 'battery'): number | null {
  const value = numberOf(fields, name);
  if (value === null) return null;
  requireWithin(name, value, BOUNDS[name]);
  return Math.round(value * 100) / 100;
}

function numberOf(fields: Fields, name: string): number | null {
  const value = fields[name];
  if (value === undefined || value === null) return null;
  if (typeof value !== 'number' || !Number.isFinite(value))
    throw new Refusal('malformed', `\`${name}\` is not a number.`);
  return value;
}

function requireWithin(name: string, value: number, [lowest, highest]: readonly [number, number]): void {
  if (value < lowest || value > highest) {
    throw new Refusal('out-of-range', `${name} is ${value}, outside ${lowest} to ${highest}.`);
  }
}

/** Flags to store: those given, and the mark of a computed LAeq. */
export function storedFlags({ flags, isLaeqComputed }: ParsedInterval): number {
  return (flags ?? 0) | (isLaeqComputed ? FLAGS.laeqComputed : 0);
}
