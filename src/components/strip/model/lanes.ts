import { FLAGS, INVALIDITY_REASONS, type InvalidityReason } from '#lib/acoustics/validity';
import { clipRun, runsWhere, type Run } from './runs';
import { type StripColumns } from './stripColumns';
import { type TimeView } from './timeView';
import { visibleParts } from './visibleParts';

export type LaneKey = 'data' | 'left-out' | 'wind' | 'rain' | 'late';

/** A row of the validity strip. `missing` are stretches that have passed without data (in the data row only). */
export interface Lane {
  key: LaneKey;
  label: string;
  runs: Run[];
  missing: Run[];
}

const WIND_REASONS: readonly InvalidityReason[] = ['wind', 'wind-speed'];
const LEFT_OUT_REASONS = INVALIDITY_REASONS.filter(
  (reason) => !WIND_REASONS.includes(reason) && reason !== 'rain',
);

/** The mask of `StripColumns.reasonBits` for some reasons. */
export function reasonMask(reasons: readonly InvalidityReason[]): number {
  return reasons.reduce((mask, reason) => mask | (1 << INVALIDITY_REASONS.indexOf(reason)), 0);
}

/** Reasons in a mask, in the order in which they are told. */
export function reasonsOfMask(mask: number): InvalidityReason[] {
  return INVALIDITY_REASONS.filter((_, bit) => (mask & (1 << bit)) !== 0);
}

/**
 * The validity strip's rows over the layers' time; where layers overlap the first one counts. `nowSec`: what has not happened yet
 * is no gap.
 */
export function lanesOf(layers: readonly StripColumns[], view: TimeView, nowSec: number): Lane[] {
  const parts = visibleParts(layers, view);
  const collect = (holds: (columns: StripColumns, at: number) => boolean): Run[] =>
    joinRuns(
      parts.flatMap(({ columns, within }) =>
        runsWhere(columns, (at) => holds(columns, at)).flatMap((run) => clipRun(run, within) ?? []),
      ),
    );
  const withReason = (reasons: readonly InvalidityReason[]) => {
    const mask = reasonMask(reasons);
    return collect((columns, at) => ((columns.reasonBits[at] ?? 0) & mask) !== 0);
  };
  const elapsed = { fromSec: view.fromSec, toSec: nowSec };
  const missing = collect((columns, at) => columns.presentSec[at] === 0);
  return [
    {
      key: 'data',
      label: 'data',
      runs: collect((columns, at) => (columns.presentSec[at] ?? 0) > 0),
      missing: missing.flatMap((run) => clipRun(run, elapsed) ?? []),
    },
    { key: 'left-out', label: 'left out', runs: withReason(LEFT_OUT_REASONS), missing: [] },
    { key: 'wind', label: 'wind', runs: withReason(WIND_REASONS), missing: [] },
    {
      key: 'rain',
      label: 'rain',
      runs: collect((columns, at) => ((columns.flagBits[at] ?? 0) & FLAGS.rain) !== 0),
      missing: [],
    },
    {
      key: 'late',
      label: 'late',
      runs: collect((columns, at) => (columns.lateSec[at] ?? 0) > 0),
      missing: [],
    },
  ];
}

/** Runs in order of time, those that touch made one. */
function joinRuns(runs: Run[]): Run[] {
  const joined: Run[] = [];
  for (const run of runs) {
    const last = joined.at(-1);
    if (last && run.fromSec <= last.toSec) last.toSec = Math.max(last.toSec, run.toSec);
    else joined.push({ ...run });
  }
  return joined;
}
