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

const isRainThatCounts: Holds = (columns, at) =>
  ((columns.flagBits[at] ?? 0) & FLAGS.rain) !== 0 && !leftOutBy(RAIN)(columns, at);

/**
 * The validity strip's rows over a view; where layers overlap the first one counts. `nowSec`: what has not happened yet is no
 * gap.
 */
export function lanesOf(layers: readonly StripColumns[], view: TimeView, nowSec: number): Lane[] {
  const parts = visibleParts(layers, view);
  const find = (kind: LaneRunKind, holds: Holds): LaneRun[] =>
    collect(parts, holds).map((run) => ({ ...run, kind }));
  const elapsed = { fromSec: view.fromSec, toSec: nowSec };
  const missing = find('missing', (columns, at) => columns.presentSec[at] === 0);
  return [
    {
      key: 'data',
      label: 'data',
      runs: [
        ...find('data', (columns, at) => (columns.presentSec[at] ?? 0) > 0),
        ...missing.flatMap((run) => toElapsed(run, elapsed)),
      ],
    },
    { key: 'left-out', label: 'left out', runs: find('left-out', leftOutBy(OTHERWISE)) },
    { key: 'wind', label: 'wind', runs: find('left-out', leftOutBy(WIND)) },
    {
      key: 'rain',
      label: 'rain',
      runs: [...find('noted', isRainThatCounts), ...find('left-out', leftOutBy(RAIN))],
    },
    { key: 'late', label: 'late', runs: find('noted', (columns, at) => (columns.lateSec[at] ?? 0) > 0) },
  ];
}

/** Stretches with data that do not count, for whatever reason. */
export function leftOutRuns(layers: readonly StripColumns[], view: TimeView): Run[] {
  return collect(visibleParts(layers, view), (columns, at) => (columns.reasonBits[at] ?? 0) !== 0);
}

function collect(parts: readonly VisiblePart[], holds: Holds): Run[] {
  return joinRuns(
    parts.flatMap(({ columns, within }) =>
      runsWhere(columns, (at) => holds(columns, at)).flatMap((run) => clipRun(run, within) ?? []),
    ),
  );
}

function toElapsed(run: LaneRun, elapsed: Run): LaneRun[] {
  const clipped = clipRun(run, elapsed);
  return clipped ? [{ ...clipped, kind: run.kind }] : [];
}
