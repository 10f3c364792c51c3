import type { ComplaintListView } from '#lib/contracts/complaintList';
import type { ComplaintListFilter } from '#lib/services/complaints/listCases';
import { addDays, startOfDaySec, type LocalDate } from '#lib/time/zone';

/** What the view asks of the list; `today` and the zone are the network's, `userId` is whoever looks. */
export function complaintFilterOf(
  view: ComplaintListView,
  { userId, today, zone }: { userId: string; today: LocalDate; zone: string },
): ComplaintListFilter {
  const { status, assignee, kind, source, area, station, from, to, reference } = view;
  return {
    ...ofStatus(status, today),
    ...(assignee === null ? {} : { assignedTo: assignee === 'me' ? userId : assignee }),
    ...(kind === null ? {} : { kind }),
    ...(source === null ? {} : { source }),
    ...(area === null ? {} : { area }),
    ...(station === null ? {} : { station }),
    ...(from === null ? {} : { fromSec: startOfDaySec(from, zone) }),
    ...(to === null ? {} : { toSec: startOfDaySec(addDays(to, 1), zone) }),
    ...(reference === null ? {} : { reference }),
  };
}

function ofStatus(status: ComplaintListView['status'], today: LocalDate): ComplaintListFilter {
  if (status === 'overdue') return { dueBefore: today };
  if (status === 'to-approve') return { isAnswerSubmitted: true };
  return status === 'all' ? {} : { status };
}
