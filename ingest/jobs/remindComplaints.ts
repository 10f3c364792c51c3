import { remindComplaints } from '#ingest/notify/remindComplaints';

/** Puts reminders of complaints that fall due, or are overdue, into the outbox, each once. */
export async function remindOfComplaints(now: Date): Promise<string> {
  return `${await remindComplaints(now)} reminders`;
}
