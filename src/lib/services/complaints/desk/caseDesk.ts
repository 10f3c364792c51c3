import { listComplaintsOfContact } from '#db/queries/complaintContacts';
import { listWithdrawnNotes } from '#db/queries/complaintNotes';
import { listComplaints, listMergedInto, type ComplaintRow } from '#db/queries/complaints';
import { pool } from '#db/queries/connection';
import type { NetworkRow } from '#db/queries/networks';
import type { PersonalData } from '#lib/contracts/complaints';
import { answerersOf } from './assign';
import { contactDigests } from './contactDigests';
import { historyOf, type HistoryEvent } from './history';
import { readNotes, type DeskNote } from './notes';

/** Another complaint, as a choice or a link. */
export interface OtherComplaint {
  reference: string;
  kind: ComplaintRow['kind'];
  fromSec: number;
  toSec: number;
}

/** What the desk knows of a complaint beside its figures and its person. */
export interface CaseDesk {
  people: { id: string; name: string }[];
  notes: DeskNote[];
  /** Numbers of notes that can be put back. */
  withdrawn: number[];
  history: HistoryEvent[];
  /** Complaints that were merged into this one. */
  repeats: OtherComplaint[];
  /** Complaints of about the same time that it may repeat. */
  mergeChoices: OtherComplaint[];
  /** How many other complaints have the same contact. */
  othersOfPerson: number;
}

const ABOUT_SEC = 86_400;
const MOST_CHOICES = 30;

/** Opens the desk's side of a complaint for a person who may read personal data; a look at notes is audited. */
export async function caseDesk(
  userId: string,
  network: NetworkRow,
  row: ComplaintRow,
  person: PersonalData | null,
): Promise<CaseDesk> {
  const notes = await readNotes(userId, row);
  const around = { fromSec: row.startsAtSec - ABOUT_SEC, toSec: row.endsAtSec + ABOUT_SEC };
  const digests = person ? contactDigests(network.id, person.contact) : [];
  const [people, withdrawn, history, repeats, near, alike] = await Promise.all([
    answerersOf(network.id),
    listWithdrawnNotes(row.id),
    historyOf(network.id, row.reference),
    listMergedInto(row.id),
    listComplaints(network.id, { ...around, limit: MOST_CHOICES }),
    listComplaintsOfContact(network.id, digests, pool()),
  ]);
  const isChoice = ({ id, mergedInto }: ComplaintRow) => id !== row.id && mergedInto === null;
  return {
    people,
    notes,
    withdrawn,
    history,
    repeats: repeats.map(otherOf),
    mergeChoices: near.filter(isChoice).map(otherOf),
    othersOfPerson: alike.filter((id) => id !== row.id).length,
  };
}

function otherOf({ reference, kind, startsAtSec, endsAtSec }: ComplaintRow): OtherComplaint {
  return { reference, kind, fromSec: startsAtSec, toSec: endsAtSec };
}
