import type {
  ClosingReason,
  Complaint,
  ComplaintKind,
  ComplaintSource,
  ComplaintStatus,
  Reply,
} from '#lib/contracts/complaints';

export const KIND_WORDS: Readonly<Record<ComplaintKind, string>> = {
  hum: 'Hum',
  whine: 'Whine',
  bang: 'Bang',
  rumble: 'Rumble',
  music: 'Music',
  traffic: 'Traffic',
  alarm: 'Alarm',
  other: 'Other',
};

export const SOURCE_WORDS: Readonly<Record<ComplaintSource, string>> = {
  desk: 'The desk',
  resident: 'The residents’ form',
};

export const STATUS_WORDS: Readonly<Record<ComplaintStatus, string>> = {
  open: 'Open',
  answered: 'Answered',
  closed: 'Closed',
};

export const CLOSING_WORDS: Readonly<Record<ClosingReason, string>> = {
  'no-contact': 'No way to reach the person',
  withdrawn: 'Withdrawn by the person',
  repeated: 'Same complaint as another one',
  'not-ours': 'Noise from outside this network',
  erased: 'Personal data erased',
};

export const DELIVERY_WORDS: Readonly<Record<Reply['delivery'], string>> = {
  waiting: 'e-mail queued',
  sent: 'e-mail handed to the mail server',
  dead: 'e-mail could not be delivered',
  letter: 'letter to print and post',
  posted: 'letter, posted',
};

/** Where a complaint stands, with how long it is overdue: `Open, overdue by 3 days`. `today` is a civil date. */
export function statusWords(complaint: Complaint, today: string): string {
  if (complaint.mergedInto) return `Merged into ${complaint.mergedInto}`;
  if (complaint.status === 'closed' && complaint.closingReason) {
    return `Closed: ${CLOSING_WORDS[complaint.closingReason].toLowerCase()}`;
  }
  if (!complaint.isOverdue) return STATUS_WORDS[complaint.status];
  const days = Math.round((Date.parse(today) - Date.parse(complaint.dueOn)) / 86_400_000);
  return `Open, overdue by ${days} ${days === 1 ? 'day' : 'days'}`;
}
