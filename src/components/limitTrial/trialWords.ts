import { LIMIT_LABELS } from '#components/limits/words.ts';
import { formatClockTime } from '#lib/contracts/common';
import type { NewLimit } from '#lib/contracts/limits';
import type { LimitTrialAnswer, TrialSummary } from '#lib/contracts/limitTrial';

/** Labels of the form's fields, by name. */
export const TRIAL_LABELS = {
  ...LIMIT_LABELS,
  since: 'First date',
  until: 'Last date',
} as const;

/** A row of two trials side by side. */
export interface SideBySide {
  label: string;
  own: number;
  today: number | null;
}

/** The counts of a trial, and of today's version where there is one. */
export function countRows({ trial, today }: LimitTrialAnswer): SideBySide[] {
  const row = (label: string, of: (summary: TrialSummary) => number): SideBySide => ({
    label,
    own: of(trial),
    today: today && of(today),
  });
  return [
    row('Windows that ended', ({ counts }) => counts.windows),
    row('Compared', ({ counts }) => counts.compared),
    row('Not compared: too little data', ({ counts }) => counts.uncovered),
    row('Not compared: no data', ({ counts }) => counts.empty),
    ...(trial.counts.dismissed + (today?.counts.dismissed ?? 0) > 0
      ? [row('Not compared: the wind', ({ counts }) => counts.dismissed)]
      : []),
    row('Above the limit', ({ counts }) => counts.caught),
    row('E-mails to each recipient', ({ mails }) => mails),
  ];
}

/** The clock times of a limit as its version shows them. */
export function clockTimes({ from, to }: Pick<NewLimit, 'from' | 'to'>) {
  return {
    from: from === null ? null : formatClockTime(from),
    to: to === null ? null : formatClockTime(to),
  };
}
