import { dirtyDays, listTraceDays, selectOutlines, selectShapes } from '#db/queries/dayTraces';
import { pool } from '#db/queries/connection';
import { type NetworkSettings } from '#db/queries/networks';
import { unpackShapes, type DayTrace } from '#lib/acoustics/dayTrace';
import { DAY_SEC, makeTrace } from './makeTrace';
import { type SearchTask } from './searchTask';

/** Days whose shapes are read at once, those before being compared meanwhile: 1.6 MB each. */
const SHAPES_AT_ONCE = 32;

type Station = SearchTask['stations'][number];

/** Days of a station that a search looks at, and those of them that its traces do not tell now. */
export interface StationDays {
  station: Station;
  /** Beginnings of days of UTC that have data, ascending. */
  days: number[];
  /** Wait for a trace or for recomputation. */
  fresh: Set<number>;
}

/** What there is of a station in `fromSec <= t < toSec`. */
export async function daysOfStation(station: Station, fromSec: number, toSec: number): Promise<StationDays> {
  const firstDaySec = fromSec - (fromSec % DAY_SEC);
  // Marks first: one that is done meanwhile has its day wait in what is read next.
  const dirty = await dirtyDays(station.id, firstDaySec, toSec);
  const traced = await listTraceDays(station.id, firstDaySec, toSec);
  const waiting = traced.filter((day) => day.isWaiting).map((day) => day.dayStartSec);
  const days = new Set([...dirty, ...traced.map((day) => day.dayStartSec)]);
  return { station, days: [...days].sort((a, b) => a - b), fresh: new Set([...dirty, ...waiting]) };
}

/** A day of a station, one after the other; without shape when its outline rules it out. */
export type Visit = (dayStartSec: number, outline: Uint8Array, trace: DayTrace | null) => void;

export interface DaysRead {
  timeline: NetworkSettings[];
  mayMatch: (outline: Uint8Array) => boolean;
  /** Whether one more day may be made from intervals. */
  mayMake: () => boolean;
  visit: Visit;
  onLeftOut: () => void;
}

/** Visits some days of a station in order of time. Shapes are read only where the outline does not rule the day out. */
export async function readDays(
  { station, fresh }: StationDays,
  days: readonly number[],
  { timeline, mayMatch, mayMake, visit, onLeftOut }: DaysRead,
): Promise<void> {
  const [first, last] = [days[0], days.at(-1)];
  if (first === undefined || last === undefined) return;
  const outlines = new Map(await selectOutlines(station.id, first, last + 1));
  const isTraced = (day: number) => !fresh.has(day) && outlines.has(day);
  const asked = new Set(days.filter((day) => isTraced(day) && mayMatch(outlines.get(day) ?? NOTHING)));
  const shapesFrom = (at: number) =>
    selectShapes(
      station.id,
      days.slice(at, at + SHAPES_AT_ONCE).filter((day) => asked.has(day)),
    );
  let reading = shapesFrom(0);
  for (let at = 0; at < days.length; at += SHAPES_AT_ONCE) {
    const shapes = new Map(await reading);
    // The database reads the days after these while this thread compares.
    reading = shapesFrom(at + SHAPES_AT_ONCE);
    reading.catch(() => undefined);
    const some = days.slice(at, at + SHAPES_AT_ONCE);
    for (const day of some) {
      const [outline, packed] = [outlines.get(day), shapes.get(day)];
      const isChanged = packed === undefined && asked.has(day);
      if (isTraced(day) && outline && !isChanged) {
        visit(day, outline, packed ? unpackShapes(packed, outline) : null);
      } else if (mayMake()) {
        const trace = await makeTrace(station, timeline, day, pool());
        if (trace) visit(day, trace.outline, trace);
      } else onLeftOut();
    }
  }
}

const NOTHING = new Uint8Array(0);
