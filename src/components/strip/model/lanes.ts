import { FLAGS, INVALIDITY_REASONS, type InvalidityReason } from '#lib/acoustics/validity';
import { clipRun, joinRuns, runsWhere, type Run } from './runs';
import { type StripColumns } from './stripColumns';
import { type TimeView } from './timeView';
import { visibleParts, type VisiblePart } from './visibleParts';

export type LaneKey = 'data' | 'left-out' | 'wind' | 'rain' | 'late';

/** `noted`: data that count, with something to know about them. `missing`: has passed without data. */
export type LaneRunKind = 'data' | 'missing' | 'left-out' | 'noted';

export interface LaneRun extends Run {
  kind: LaneRunKind;
}

/** A row of the validity strip. */
export interface Lane {
  key: LaneKey;
  label: string;
  runs: LaneRun[];
}

type Holds = (columns: StripColumns, at: number) => boolean;

/** The mask of `StripColumns.reasonBits` for some reasons. */
export function reasonMask(reasons: readonly InvalidityReason[]): number {
  return reasons.reduce((mask, reason) => mask | (1 << INVALIDITY_REASONS.indexOf(reason)), 0);
}

/** Reasons in a mask, in the order in which they are told. */
export function reasonsOfMask(mask: number): InvalidityReason[] {
  return INVALIDITY_REASONS.filter((_, bit) => (mask & (1 << bit)) !== 0);
}

const WIND = reasonMask(['wind', 'wind-speed', 'mast-wind']);
const RAIN = reasonMask(['rain', 'mast-rain']);
const OTHERWISE = reasonMask([...INVALIDITY_REASONS]) & ~WIND & ~RAIN;

const leftOutBy =
  (mask: number): Holds =>
  (columns, at) =>
    ((columns.reasonBits[at] ?? 0) & mask) !== 0;

const isWindy = leftOutBy(WIND);
const isRainy = leftOutBy(RAIN);
const isLeftOutOtherwise = leftOutBy(OTHERWISE);
const isMissing: Holds = (columns, at) => columns.presentSec[at] === 0;
const isThere: Holds = (columns, at) => (columns.presentSec[at] ?? 0) > 0;
const isLate: Holds = (columns, at) => (columns.lateSec[at] ?? 0) > 0;
const isLeftOut: Holds = (columns, at) => (columns.reasonBits[at] ?? 0) !== 0;

const isRainThatCounts: Holds = (columns, at) =>
  ((columns.flagBits[at] ?? 0) & FLAGS.rain) !== 0 && !isRainy(columns, at);

/**
 * The validity strip's rows over a view; where layers overlap the first one counts. `nowSec`: what has not happened yet is no
 * gap.
 */
export function lanesOf(layers: readonly StripColumns[], view: TimeView, nowSec: number): Lane[] {
  const parts = visibleParts(layers, view);
  const find = (kind: LaneRunKind, holds: Holds): LaneRun[] =>
    collect(parts, holds).map((run) => ({ ...run, kind }));
  const elapsed = { fromSec: view.fromSec, toSec: nowSec };
  const missing = find('missing', isMissing);
  return [
    {
      key: 'data',
      label: 'data',
      runs: [...find('data', isThere), ...missing.flatMap((run) => toElapsed(run, elapsed))],
    },
    { key: 'left-out', label: 'left out', runs: find('left-out', isLeftOutOtherwise) },
    { key: 'wind', label: 'wind', runs: find('left-out', isWindy) },
    {
      key: 'rain',
      label: 'rain',
      runs: [...find('noted', isRainThatCounts), ...find('left-out', isRainy)],
    },
    { key: 'late', label: 'late', runs: find('noted', isLate) },
  ];
}

/** Stretches with data that do not count, for whatever reason. */
export function leftOutRuns(layers: readonly StripColumns[], view: TimeView): Run[] {
  return collect(visibleParts(layers, view), isLeftOut);
}

function collect(parts: readonly VisiblePart[], holds: Holds): Run[] {
  return joinRuns(
    parts.flatMap(({ columns, within }) =>
      runsOf(columns, holds).flatMap((run) => clipRun(run, within) ?? []),
    ),
  );
}

const known = new WeakMap<StripColumns, Map<Holds, Run[]>>();

/** Runs of a whole layer, found once: a picture in motion asks for them every frame. */
function runsOf(columns: StripColumns, holds: Holds): Run[] {
  const ofColumns = known.get(columns) ?? new Map<Holds, Run[]>();
  known.set(columns, ofColumns);
  const runs = ofColumns.get(holds) ?? runsWhere(columns, (at) => holds(columns, at));
  ofColumns.set(holds, runs);
  return runs;
}

function toElapsed(run: LaneRun, elapsed: Run): LaneRun[] {
  const clipped = clipRun(run, elapsed);
  return clipped ? [{ ...clipped, kind: run.kind }] : [];
}
