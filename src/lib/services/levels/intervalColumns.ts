import { type MeasuredInterval } from '#db/queries/intervalRows';
import { bandSlot } from '#lib/acoustics/bands';
import { energyOfCentiDb, levelOfEnergyDb } from '#lib/acoustics/energy';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { toCentiDb } from '#lib/acoustics/rounding';
import { counts, firstEndingAfter, rulesSpans, type Judgement, type RulesSpan } from './accumulate';
import { addAt, lowerAt, raiseAt, setBitsAt, type Columns } from './columns';
import { overlapSec } from './quarterOf';
import { isLate, reasonBitsOf } from './seen';
import { type Span } from './spans';

/**
 * Fills the columns that begin in `part` from intervals (ascending, disjoint): energy means by duration of everything measured,
 * counted or not. A column that is one interval's alone takes its levels as they are.
 */
export function fillFromIntervals(
  columns: Columns,
  intervals: readonly MeasuredInterval[],
  part: Span,
  judgement: Judgement,
): void {
  const { plan } = columns;
  const rules = rulesSpans(part.fromSec, part.toSec, judgement.timeline);
  let first = firstEndingAfter(intervals, part.fromSec);
  for (let at = (part.fromSec - plan.fromSec) / plan.stepSec; at < plan.count; at += 1) {
    const fromSec = plan.fromSec + at * plan.stepSec;
    if (fromSec >= part.toSec) return;
    const toSec = fromSec + plan.stepSec;
    let end = first;
    while ((intervals[end]?.startSec ?? Infinity) < toSec) end += 1;
    const only = end === first + 1 ? intervals[first] : undefined;
    if (only) {
      noteInterval(columns, at, only, { fromSec, toSec }, rules, judgement);
      takeLevels(columns, at, only);
    } else if (end > first) {
      const within = intervals.slice(first, end);
      for (const interval of within)
        noteInterval(columns, at, interval, { fromSec, toSec }, rules, judgement);
      fillLevels(columns, at, within, { fromSec, toSec });
    }
    const last = intervals[end - 1];
    // The last one may reach into the next column.
    first = end > first && last && last.startSec + last.durationSec > toSec ? end - 1 : end;
  }
}

function noteInterval(
  columns: Columns,
  at: number,
  interval: MeasuredInterval,
  { fromSec, toSec }: Span,
  rules: readonly RulesSpan[],
  judgement: Judgement,
): void {
  const sec = overlapSec(interval, fromSec, toSec);
  addAt(columns.presentSec, at, sec);
  setBitsAt(columns.flagBits, at, interval.flags);
  if (isLate(interval)) addAt(columns.lateSec, at, sec);
  raiseAt(columns.lafmaxCentiDb, at, interval.lafmaxCentiDb);
  lowerAt(columns.lafminCentiDb, at, interval.lafminCentiDb);
  for (const span of rules) {
    const judgedSec = overlapSec(interval, Math.max(fromSec, span.fromSec), Math.min(toSec, span.toSec));
    if (judgedSec <= 0) continue;
    if (counts(interval, span.rules, judgement)) addAt(columns.validSec, at, judgedSec);
    else setBitsAt(columns.reasonBits, at, reasonBitsOf(interval, span.rules, judgement));
  }
}

interface Places extends Record<'indices' | 'placeOfSlot' | 'places', Int8Array> {
  /** Whether every band is shown, one beside the other. */
  isRun: boolean;
}

const NONE = new Int8Array(0);
let lastPlaces: Places = { indices: NONE, placeOfSlot: NONE, places: NONE, isRun: false };

/** Places in the columns' bands of an interval's; −1 for those that are not shown. Intervals of one band set share it. */
function placesOf(columns: Columns, { bandFraction, bandIndices }: MeasuredInterval): Int8Array | null {
  if (bandFraction !== columns.bands[0]?.fraction) return null;
  if (lastPlaces.indices !== bandIndices || lastPlaces.placeOfSlot !== columns.placeOfSlot) {
    const places = bandIndices.map((index) => columns.placeOfSlot[bandSlot(index)] ?? -1);
    const first = places[0] ?? -1;
    const isRun = first >= 0 && places.every((place, at) => place === first + at);
    lastPlaces = { indices: bandIndices, placeOfSlot: columns.placeOfSlot, places, isRun };
  }
  return lastPlaces.places;
}

/** Levels of a column that is one interval's alone. */
function takeLevels(columns: Columns, at: number, interval: MeasuredInterval): void {
  const { levelsCentiDb } = columns;
  const offset = at * columns.bands.length;
  columns.laeqCentiDb[at] = interval.laeqCentiDb;
  const places = placesOf(columns, interval);
  if (!places) return;
  if (lastPlaces.isRun) {
    levelsCentiDb.set(interval.levelsCentiDb, offset + (places[0] ?? 0));
    return;
  }
  for (let i = 0; i < places.length; i += 1) {
    const place = places[i] ?? -1;
    if (place >= 0) levelsCentiDb[offset + place] = interval.levelsCentiDb[i] ?? NO_LEVEL_CENTI_DB;
  }
}

function fillLevels(columns: Columns, at: number, within: readonly MeasuredInterval[], column: Span): void {
  const { bands, levelsCentiDb, laeqCentiDb } = columns;
  const offset = at * bands.length;
  const energies = new Float64Array(bands.length + 1);
  const seconds = new Float64Array(bands.length + 1);
  const add = (place: number, centiDb: number, sec: number) => {
    energies[place] = (energies[place] ?? 0) + energyOfCentiDb(centiDb) * sec;
    seconds[place] = (seconds[place] ?? 0) + sec;
  };
  for (const interval of within) {
    const sec = overlapSec(interval, column.fromSec, column.toSec);
    add(bands.length, interval.laeqCentiDb, sec);
    const places = placesOf(columns, interval);
    if (!places) continue;
    for (let i = 0; i < places.length; i += 1) {
      const place = places[i] ?? -1;
      const centiDb = interval.levelsCentiDb[i] ?? NO_LEVEL_CENTI_DB;
      if (place >= 0 && centiDb !== NO_LEVEL_CENTI_DB) add(place, centiDb, sec);
    }
  }
  const levelOf = (place: number) => meanCentiDb(energies[place] ?? 0, seconds[place] ?? 0);
  laeqCentiDb[at] = levelOf(bands.length);
  for (let place = 0; place < bands.length; place += 1) levelsCentiDb[offset + place] = levelOf(place);
}

/** Mean level in hundredths of a dB of an energy summed over seconds; −32768 for none. */
export function meanCentiDb(energySec: number, sec: number): number {
  const levelDb = sec === 0 ? null : levelOfEnergyDb(energySec / sec);
  return levelDb === null ? NO_LEVEL_CENTI_DB : toCentiDb(levelDb);
}
