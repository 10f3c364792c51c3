import { type AuditFilter } from '#db/queries/auditLog';
import { actInWords } from '#lib/format/auditActs';
import { csvText } from '#lib/format/csvText';
import { auditTrail, type Act } from './trail';

/** Acts in one file at most; the newest of those asked for. */
const MOST_CSV_ACTS = 20_000;

const HEADER = ['id', 'at', 'person', 'address', 'network', 'action', 'subject', 'details', 'words'];

/** The acts that fit as CSV, newest first; times in UTC. */
export async function auditCsv(filter: AuditFilter): Promise<string> {
  const { acts } = await auditTrail(filter, MOST_CSV_ACTS);
  return csvText([HEADER, ...acts.map(rowOf)]);
}

function rowOf({ id, at, person, fromAddress, network, action, subject, details }: Act) {
  return [
    id,
    at.toISOString(),
    person?.name ?? null,
    fromAddress,
    network?.slug ?? null,
    action,
    subject,
    details.join('; '),
    actInWords(action),
  ];
}
