import type { ComplaintRow } from '#db/queries/complaints';
import type { ReplyRow } from '#db/queries/complaintReplies';
import { formatInstantUtc } from '#lib/contracts/common';
import type { Complaint, Reply } from '#lib/contracts/complaints';
import type { LocalDate } from '#lib/time/zone';

/** A complaint as everybody with a role in the network may read it; `today` is the network's civil date. */
export function complaintView(row: ComplaintRow, today: LocalDate): Complaint {
  const { coarseLatitude: latitude, coarseLongitude: longitude } = row;
  return {
    reference: row.reference,
    from: formatInstantUtc(row.startsAtSec),
    to: formatInstantUtc(row.endsAtSec),
    kind: row.kind,
    status: row.status,
    source: row.source,
    dueOn: row.dueOn,
    isOverdue: row.status === 'open' && row.dueOn < today,
    coarsePlace: latitude === null || longitude === null ? null : { latitude, longitude },
    nearestStation: row.nearestStationCode,
    area: row.area,
    assignedTo: row.assignedToName,
    mergedInto: row.mergedInto,
    createdAt: row.createdAt.toISOString(),
    answeredAt: row.answeredAt?.toISOString() ?? null,
    closedAt: row.closedAt?.toISOString() ?? null,
    closingReason: row.closingReason,
  };
}

/** A reply without its text, which is personal: when, by whom, how, and on which figures. */
export function replyView(row: ReplyRow): Reply {
  return {
    id: row.id,
    sentAt: row.createdAt.toISOString(),
    sentBy: row.sentBy,
    approvedBy: row.approvedBy,
    delivery: row.mailState ?? (row.postedOn === null ? 'letter' : 'posted'),
    deliveredAt: row.mailSentAt?.toISOString() ?? null,
    attempts: row.mailAttempts,
    failure: row.mailState === 'sent' ? null : row.mailError,
    postedOn: row.postedOn,
    items: row.items,
    hasPdf: row.hasPdf,
    figures: row.figures,
  };
}
