import {
  findActivity,
  listActivities,
  listActivityKinds,
  selectStandingActivities,
  type ActivityListQuery,
} from '#db/queries/activities';
import { SUGGESTED_ACTIVITIES, type Activity } from '#lib/contracts/activities';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Span } from '../levels/spans';
import { csvText } from '#lib/format/csvText';
import { activityJson } from './activityJson';

export interface ActivityPageQuery extends Omit<ActivityListQuery, 'after'> {
  /** Sorting numbers of the last one of the page before, as its `next` gave them. */
  cursor: number[] | null;
}

/** A page of the operations log, withdrawn entries too, latest beginning first; `next` is null on the last page. */
export async function activityPage({
  cursor,
  ...query
}: ActivityPageQuery): Promise<{ items: Activity[]; next: number[] | null }> {
  const [fromSec, id] = cursor ?? [];
  const after = fromSec === undefined || id === undefined ? null : { fromSec, id };
  const rows = await listActivities({ ...query, limit: query.limit + 1, after });
  const items = rows.slice(0, query.limit);
  const last = items.at(-1);
  const next = rows.length > query.limit && last ? [last.fromSec, last.id] : null;
  return { items: items.map(activityJson), next };
}

/** An entry of the operations log; null when the network has none with this number. */
export async function activityOf(networkId: number, id: number): Promise<Activity | null> {
  const row = await findActivity(networkId, id);
  return row ? activityJson(row) : null;
}

/** Kinds to choose from: those noted, most frequent first, then the suggested ones. */
export async function activityKinds(networkId: number): Promise<string[]> {
  const noted = await listActivityKinds(networkId);
  const lower = new Set(noted.map((kind) => kind.toLowerCase()));
  return [...noted, ...SUGGESTED_ACTIVITIES.filter((kind) => !lower.has(kind))];
}

/** The standing entries that overlap a period as a file that can be brought back; all of a kind, or of every kind. */
export async function activitiesCsv(networkId: number, period: Span, kind: string | null): Promise<string> {
  const rows = await selectStandingActivities(networkId, period, kind);
  return csvText([
    ['kind', 'place', 'from', 'to', 'note'],
    ...rows.map((row) => [
      row.kind,
      row.place,
      formatInstantUtc(row.fromSec),
      formatInstantUtc(row.toSec),
      row.note,
    ]),
  ]);
}
