import { listAudit, type AuditRecord } from '#db/queries/auditLog';
import { listUsers } from '#db/queries/users';
import { actInWords } from '#lib/format/auditActs';
import { detailWords } from './actWords';

/** Something that was done to a complaint, in words without anything personal. */
export interface HistoryEvent {
  id: number;
  at: Date;
  /** Name; null: nobody who signed in (a resident, or a job). */
  by: string | null;
  what: string;
}

const MOST_EVENTS = 500;

/** What was done to a complaint and by whom, oldest first, as the audit trail has it; looks at personal data among it. */
export async function historyOf(networkId: number, reference: string): Promise<HistoryEvent[]> {
  const [events, people] = await Promise.all([
    listAudit({ networkId, subject: `complaint ${reference}` }, MOST_EVENTS),
    listUsers(),
  ]);
  const names = new Map(people.map(({ id, name }) => [id, name]));
  return events.toReversed().map((event) => ({
    id: event.id,
    at: event.at,
    by: event.userId === null ? null : (names.get(event.userId) ?? 'a person who is no longer there'),
    what: wordsOf(event),
  }));
}

function wordsOf({ action, detail }: AuditRecord): string {
  const words = actInWords(action);
  const more = detailWords(detail);
  return more === '' ? words : `${words} (${more})`;
}
