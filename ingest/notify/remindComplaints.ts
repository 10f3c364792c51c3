import { putNotes, type Note } from '#ingest/health/mail';
import { listAnswerers, listDueBetween, type DueComplaint } from '#db/queries/complaintDesk';
import { readDeskSettings } from '#db/queries/complaintSettings';
import { inTransaction } from '#db/queries/connection';
import { listNetworks, settingsAt, type NetworkRow } from '#db/queries/networks';
import { config } from '#lib/config/index';
import { formatLocalDate } from '#lib/format/times';
import { addWorkingDays, workingCalendarOf } from '#lib/services/complaints/dueDate';
import { addDays, localDateAt } from '#lib/time/zone';
import { eachAlone, networkSubject } from '../jobs/alone';

/** What is overdue longer was told of when it became so, or came in before there were reminders. */
const TOLD_OVERDUE_DAYS = 60;

/**
 * Reminds of open complaints, each twice at most: some working days before the due date, and once it has passed. The person who answers
 * it is told, or everybody who may where it is given to nobody. A new due date begins anew. @returns messages put.
 */
export async function remindComplaints(now: Date): Promise<number> {
  const remind = (network: NetworkRow) => remindNetwork(network, now);
  return eachAlone('remind-complaints', await listNetworks(), networkSubject, remind, now);
}

async function remindNetwork(network: NetworkRow, now: Date): Promise<number> {
  const { timeZone } = await settingsAt(network.id, Math.floor(now.getTime() / 1000));
  const today = localDateAt(Math.floor(now.getTime() / 1000), timeZone);
  const desk = await readDeskSettings(network.id);
  const calendar = await workingCalendarOf(network.id, desk);
  const soon = desk.remindDays === 0 ? addDays(today, -1) : addWorkingDays(today, desk.remindDays, calendar);
  const due = await listDueBetween(network.id, addDays(today, -TOLD_OVERDUE_DAYS), soon);
  if (due.length === 0) return 0;
  const people = await listAnswerers(network.id);
  const remind = (complaint: DueComplaint) => {
    const isOverdue = complaint.dueOn < today;
    const assigned = people.filter(({ id }) => id === complaint.assignedTo);
    const told = assigned.length > 0 ? assigned : people;
    const kind = isOverdue ? 'complaint-overdue' : 'complaint-due';
    const cause = { networkId: network.id, kind, key: `${complaint.id}:${complaint.dueOn}` };
    const addresses = told.map(({ email }) => email);
    const note = noteOf(complaint, network, isOverdue);
    return inTransaction((transaction) => putNotes(note, cause, addresses, transaction));
  };
  const subjectOf = ({ id }: DueComplaint) => ({ name: `complaint ${id}`, networkId: network.id });
  return eachAlone('remind-complaints', due, subjectOf, remind, now);
}

/** Nothing of the complaint but its reference and date: mail is read on the way. */
function noteOf({ reference, dueOn }: DueComplaint, network: NetworkRow, isOverdue: boolean): Note {
  const due = formatLocalDate(dueOn);
  const base = `${config().origin}/n/${network.slug}/complaints`;
  return {
    subject: `${network.name}: the answer to ${reference} ${isOverdue ? 'was' : 'is'} due ${due}`,
    opening: isOverdue
      ? `Complaint ${reference} has not been answered; the answer was due on ${due}.`
      : `Complaint ${reference} is to be answered by ${due}.`,
    facts: [['Due', due]],
    link: { label: 'Open the complaint', url: `${base}/${reference}` },
    closing: `You are reminded once before the due date and once after it. When: ${base}/settings`,
  };
}
