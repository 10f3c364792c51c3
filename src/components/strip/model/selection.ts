import { bandAt, bandByNominalHz, type Band, type BandFraction } from '#lib/acoustics/bands';
import { formatInstantUtc, parseInstant } from '#lib/contracts/instants';

/** What a person has marked: a stretch of time, whole seconds, and a range of bands or (null) all of them. */
export interface Selection {
  fromSec: number;
  toSec: number;
  bands: BandSelection | null;
}

export interface BandSelection {
  fraction: BandFraction;
  lowestIndex: number;
  highestIndex: number;
}

/** Bands of the list that a selection takes in; all of them where it names none. */
export function selectedBands(selection: Selection, bands: readonly Band[]): Band[] {
  const { bands: range } = selection;
  if (range === null) return [...bands];
  const lowerHz = bandAt(range.fraction, range.lowestIndex).lowerHz;
  const upperHz = bandAt(range.fraction, range.highestIndex).upperHz;
  return bands.filter((band) => band.exactHz > lowerHz && band.exactHz < upperHz);
}

/**
 * A selection in the address: ISO 8601 interval, then bands by their nominal frequencies in Hz (`o` before those of octaves):
 * `2026-03-17T20:58:00Z/2026-03-17T22:04:00Z/80-125`.
 */
export function formatSelection({ fromSec, toSec, bands }: Selection): string {
  const period = `${formatInstantUtc(fromSec)}/${formatInstantUtc(toSec)}`;
  if (bands === null) return period;
  const hz = (index: number) => bandAt(bands.fraction, index).nominalHz;
  return `${period}/${bands.fraction === 1 ? 'o' : ''}${hz(bands.lowestIndex)}-${hz(bands.highestIndex)}`;
}

/** The selection that an address carries, or null when it carries none that makes sense. */
export function parseSelection(text: string): Selection | null {
  const [from, to, bandsText] = text.split('/');
  const fromSec = parseInstant(from ?? '');
  const toSec = parseInstant(to ?? '');
  if (fromSec === null || toSec === null || fromSec >= toSec) return null;
  const bands = bandsText === undefined ? null : parseBands(bandsText);
  return bands === undefined ? null : { fromSec: Math.floor(fromSec), toSec: Math.ceil(toSec), bands };
}

function parseBands(text: string): BandSelection | undefined {
  const match = /^(o?)(\d+(?:\.\d+)?)-(\d+(?:\.\d+)?)$/.exec(text);
  if (!match) return undefined;
  const fraction: BandFraction = match[1] === 'o' ? 1 : 3;
  const lowest = bandByNominalHz(fraction, Number(match[2]));
  const highest = bandByNominalHz(fraction, Number(match[3]));
  if (!lowest || !highest || lowest.index > highest.index) return undefined;
  return { fraction, lowestIndex: lowest.index, highestIndex: highest.index };
}
