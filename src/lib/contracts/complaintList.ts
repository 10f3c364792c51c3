import { localDate } from './common';
import {
  COMPLAINT_KINDS,
  COMPLAINT_SOURCES,
  COMPLAINT_STATUSES,
  type ComplaintKind,
  type ComplaintSource,
  type ComplaintStatus,
} from './complaints';

/** Which complaints the list shows, as its address says; null: does not matter. */
export interface ComplaintListView {
  /** `overdue`: open ones whose due date has passed; `to-approve`: those whose answer waits for a second person. */
  status: ComplaintStatus | 'overdue' | 'to-approve' | 'all';
  /** Id of a person, `me` or `nobody`. */
  assignee: string | null;
  kind: ComplaintKind | null;
  source: ComplaintSource | null;
  area: string | null;
  station: string | null;
  /** First and last civil date on which the noise was heard. */
  from: string | null;
  to: string | null;
  /** Part of the reference. */
  reference: string | null;
}

/** An answer that waits for a second person, without what it says. */
export interface WaitingAnswer {
  authorName: string;
  /** Written by whoever looks, who cannot approve it. */
  isOwn: boolean;
}

const STATUSES = [...COMPLAINT_STATUSES, 'overdue', 'all'] as const;
/** What concerns only those who answer complaints. */
const STATUSES_OF_ANSWERERS = [...STATUSES, 'to-approve'] as const;
const MOST_CHARACTERS = 80;

/**
 * Reads an address; what it says wrongly, or what whoever looks may not see, counts as left out. Without a status the open ones are
 * meant.
 */
export function readComplaintList(
  { searchParams }: URL,
  { isAnswerer }: { isAnswerer: boolean },
): ComplaintListView {
  const text = (name: string) => {
    const value = searchParams.get(name)?.trim() ?? '';
    return value === '' || value.length > MOST_CHARACTERS ? null : value;
  };
  const choice = <T extends string>(name: string, choices: readonly T[]) =>
    choices.find((one) => one === text(name)) ?? null;
  const date = (name: string) => {
    const value = text(name);
    return localDate.safeParse(value).success ? value : null;
  };
  return {
    status: choice('status', isAnswerer ? STATUSES_OF_ANSWERERS : STATUSES) ?? 'open',
    assignee: text('assignee'),
    kind: choice('kind', COMPLAINT_KINDS),
    source: choice('source', COMPLAINT_SOURCES),
    area: text('area'),
    station: text('station'),
    from: date('from'),
    to: date('to'),
    reference: text('reference'),
  };
}

/** The address of a view as a query with its question mark; `cursor` goes on from a place. */
export function complaintListQuery(view: ComplaintListView, cursor: string | null = null): string {
  const given = Object.entries({ ...view, cursor }).filter(
    (entry): entry is [string, string] => entry[1] !== null,
  );
  return `?${new URLSearchParams(given).toString()}`;
}

/** How many of a view's fields beside the status narrow it. */
export function narrowingCount(view: ComplaintListView): number {
  return Object.entries(view).filter(([name, value]) => name !== 'status' && value !== null).length;
}
