import { spanSec, type TimeView } from './timeView';

/** What to ask the server for: whole columns of one step. */
export interface FetchPlan {
  fromSec: number;
  toSec: number;
  stepSec: number;
  columns: number;
}

/** Lengths of a column that divide an hour or a day evenly, so that columns of different requests lie on one grid. */
const STEPS_SEC = [1, 2, 5, 10, 15, 30, 60, 120, 300, 600, 900, 1800, 3600, 7200, 10800, 21600, 43200, 86400];

/** Beyond this the server answers from quarter-hours, so that a column is whole quarter-hours. */
export const LONG_PERIOD_SEC = 14 * 86_400;
const QUARTER_SEC = 900;

/** Share of the view that is fetched beyond each of its edges, so that a short pan has something to show. */
const MARGIN = 0.3;

/** Columns that one answer may have. */
const MOST_COLUMNS = 4000;

/**
 * The columns to fetch for a view drawn on `widthPx` device pixels: the longest step of the ladder that is no longer than a
 * pixel, a whole multiple of the station's interval, with a margin on both sides but not beyond `latestSec`. Longer steps
 * are taken where one answer would not hold the columns.
 */
export function fetchPlan(
  view: TimeView,
  widthPx: number,
  intervalSec: number,
  latestSec: number,
): FetchPlan {
  const marginSec = spanSec(view) * MARGIN;
  const stepSec = chooseStep(
    spanSec(view) / Math.max(1, widthPx),
    intervalSec,
    spanSec(view) + 2 * marginSec,
  );
  const fromSec = Math.max(0, Math.floor((view.fromSec - marginSec) / stepSec) * stepSec);
  const endSec = Math.max(view.fromSec + stepSec, Math.min(view.toSec + marginSec, latestSec));
  const toSec = Math.ceil(endSec / stepSec) * stepSec;
  return { fromSec, toSec, stepSec, columns: (toSec - fromSec) / stepSec };
}

function chooseStep(pixelSec: number, intervalSec: number, fetchedSec: number): number {
  const unitSec =
    fetchedSec > LONG_PERIOD_SEC - QUARTER_SEC ? leastMultiple(QUARTER_SEC, intervalSec) : intervalSec;
  const leastSec = fetchedSec / (MOST_COLUMNS - 2);
  const steps = STEPS_SEC.filter((step) => step % unitSec === 0 && step >= leastSec);
  return (
    steps.filter((step) => step <= pixelSec).at(-1) ?? steps[0] ?? Math.ceil(leastSec / unitSec) * unitSec
  );
}

function leastMultiple(a: number, b: number): number {
  let multiple = Math.max(a, b);
  const step = multiple;
  while (multiple % a !== 0 || multiple % b !== 0) multiple += step;
  return multiple;
}

/** Whether fetched columns already show a view as finely as `plan` would. */
export function isServedBy(plan: FetchPlan, view: TimeView, have: Omit<FetchPlan, 'columns'>): boolean {
  return (
    have.stepSec === plan.stepSec &&
    have.fromSec <= view.fromSec &&
    have.toSec >= Math.min(view.toSec, plan.toSec)
  );
}
