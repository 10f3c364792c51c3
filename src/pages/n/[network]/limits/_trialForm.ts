import { z } from 'zod';
import { localDate } from '#lib/contracts/common';
import { newLimitSchema, type Limit } from '#lib/contracts/limits';
import { MOST_TRIAL_DAYS, type LimitTrialQuery } from '#lib/contracts/limitTrial';
import { addDays, isLocalDate, localDateAt } from '#lib/time/zone';
import { limitOfForm, limitValues, NEW_LIMIT_VALUES, type LimitValues } from './_limitForm';

const DAYS_AT_FIRST = 30;

/** Dates of the form; the last one is tried too. Named apart from the clock times of the limit. */
const datesSchema = z
  .object({ since: localDate, until: localDate })
  .superRefine(({ since, until }, context) => {
    if (!isLocalDate(since) || !isLocalDate(until)) return;
    const message =
      until < since
        ? 'must not be before the first date'
        : until >= addDays(since, MOST_TRIAL_DAYS)
          ? `must be at most ${MOST_TRIAL_DAYS} days from the first`
          : null;
    if (message) context.addIssue({ code: 'custom', path: ['until'], message });
  });

/** What the form asks to be tried. @throws {ZodError} by the form's fields. */
export function trialOfForm({ text, all }: LimitValues, zone: string): LimitTrialQuery {
  const { since, until } = datesSchema.parse({ since: text['since'] ?? '', until: text['until'] ?? '' });
  const limit = limitOfForm(
    { text: { ...text, name: text['name'] || 'Trial', effectiveFrom: '' }, all },
    zone,
  );
  return {
    limit: newLimitSchema.parse(limit),
    from: since,
    to: addDays(until, 1),
    basedOn: Number(text['limit']) || null,
  };
}

/** What the form shows at first: the limit that a change is tried of, or a new one; on the last 30 days. */
export function firstTrialValues(limit: Limit | null, nowSec: number, zone: string): LimitValues {
  const { text, all } = limit ? limitValues(limit, zone) : NEW_LIMIT_VALUES;
  const until = localDateAt(nowSec, zone);
  return { text: { ...text, since: addDays(until, 1 - DAYS_AT_FIRST), until }, all };
}

/** What the form of a change shows: what was tried, where the address says that, with the saved name and addresses. */
export function triedValues(tried: LimitValues, saved: LimitValues): LimitValues {
  if (tried.text['metric'] === undefined) return saved;
  const { name = '', recipients = '', effectiveFrom = '' } = saved.text;
  return { text: { name, recipients, effectiveFrom, ...tried.text }, all: (field) => tried.all(field) };
}

/** The address of the form that sets what was tried. */
export function settingHref(base: string, query: URLSearchParams): string {
  const fields = new URLSearchParams(query);
  const limit = fields.get('limit');
  for (const name of ['since', 'until', 'limit']) fields.delete(name);
  return limit ? `${base}/${encodeURIComponent(limit)}/edit?${fields}` : `${base}/new?${fields}`;
}
