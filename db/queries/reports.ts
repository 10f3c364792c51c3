import { type AttachmentType, type ReportArea, type ReportLanguage } from '#lib/contracts/reports';
import type { LocalDate } from '#lib/time/zone';
import { pool, type Connection } from './connection';

/** The residents' form of a network. */
export interface ReportForm {
  isOpen: boolean;
  areas: ReportArea[];
  /** Who keeps what residents send, and how to reach them. */
  keeper: string;
}

/** Undefined for a network whose form was never set up. */
export async function findReportForm(
  networkId: number,
  conn: Connection = pool(),
): Promise<ReportForm | undefined> {
  const row = await conn('report_forms').where({ network_id: networkId }).first('is_open', 'areas', 'keeper');
  return row && { isOpen: Boolean(row.is_open), areas: row.areas as ReportArea[], keeper: row.keeper };
}

export async function writeReportForm(
  networkId: number,
  { isOpen, areas, keeper }: ReportForm,
  changedBy: string,
  conn: Connection,
): Promise<void> {
  await conn('report_forms')
    .insert({
      network_id: networkId,
      is_open: isOpen,
      areas: JSON.stringify(areas),
      keeper,
      changed_by: changedBy,
      changed_at: new Date(),
    })
    .onConflict('network_id')
    .merge();
}

/** What a resident's report has beside the complaint; nothing of it is personal. */
export interface ReportRow {
  complaintId: number;
  reference: string;
  area: string | null;
  language: ReportLanguage;
}

/** Keeps a report beside its complaint. Fails as a duplicate when the key is there already. */
export async function insertReport(
  report: Omit<ReportRow, 'reference' | 'area'> & { keyDigest: Buffer },
  conn: Connection,
): Promise<void> {
  await conn('complaint_reports').insert({
    complaint_id: report.complaintId,
    key_digest: report.keyDigest,
    language: report.language,
    created_at: new Date(),
  });
}

export async function findReportByKey(
  networkId: number,
  keyDigest: Buffer,
  conn: Connection = pool(),
): Promise<ReportRow | undefined> {
  return selectReports(conn).where({ 'c.network_id': networkId, 'r.key_digest': keyDigest }).first();
}

/** Undefined for a complaint that the liaison logged. */
export async function findReport(
  complaintId: number,
  conn: Connection = pool(),
): Promise<ReportRow | undefined> {
  return selectReports(conn).where({ 'r.complaint_id': complaintId }).first();
}

function selectReports(conn: Connection) {
  return conn('complaint_reports as r').join('complaints as c', 'c.id', 'r.complaint_id').select({
    complaintId: 'r.complaint_id',
    reference: 'c.reference',
    area: 'c.area',
    language: 'r.language',
  });
}

export async function insertAddition(
  complaintId: number,
  ciphertext: Buffer,
  conn: Connection,
): Promise<void> {
  await conn('complaint_additions').insert({
    complaint_id: complaintId,
    ciphertext,
    created_at: new Date(),
  });
}

export interface SealedAddition {
  createdAt: Date;
  wrappedKey: Buffer;
  ciphertext: Buffer;
}

/** What a resident wrote later, oldest first; none once the personal data have been erased. */
export async function listSealedAdditions(
  complaintId: number,
  conn: Connection = pool(),
): Promise<SealedAddition[]> {
  return conn('complaint_additions as a')
    .join('complaint_keys as k', 'k.complaint_id', 'a.complaint_id')
    .where({ 'a.complaint_id': complaintId })
    .orderBy('a.id')
    .select({ createdAt: 'a.created_at', wrappedKey: 'k.wrapped_key', ciphertext: 'a.ciphertext' });
}

export interface AttachmentInfo {
  mediaType: AttachmentType;
  byteCount: number;
}

export async function insertAttachment(
  attachment: AttachmentInfo & { complaintId: number; ciphertext: Buffer },
  conn: Connection,
): Promise<void> {
  await conn('complaint_attachments').insert({
    complaint_id: attachment.complaintId,
    media_type: attachment.mediaType,
    byte_count: attachment.byteCount,
    ciphertext: attachment.ciphertext,
    created_at: new Date(),
  });
}

/** What is attached, without its bytes. */
export async function findAttachmentInfo(
  complaintId: number,
  conn: Connection = pool(),
): Promise<AttachmentInfo | undefined> {
  return conn('complaint_attachments')
    .where({ complaint_id: complaintId })
    .first({ mediaType: 'media_type', byteCount: 'byte_count' });
}

export async function findSealedAttachment(
  complaintId: number,
  conn: Connection = pool(),
): Promise<(AttachmentInfo & { wrappedKey: Buffer; ciphertext: Buffer }) | undefined> {
  return conn('complaint_attachments as a')
    .join('complaint_keys as k', 'k.complaint_id', 'a.complaint_id')
    .where({ 'a.complaint_id': complaintId })
    .first({
      mediaType: 'a.media_type',
      byteCount: 'a.byte_count',
      wrappedKey: 'k.wrapped_key',
      ciphertext: 'a.ciphertext',
    });
}

/** An answered complaint waits for an answer again, by a new date. */
export async function reopenComplaint(
  complaintId: number,
  dueOn: LocalDate,
  conn: Connection,
): Promise<void> {
  await conn('complaints')
    .where({ id: complaintId, status: 'answered' })
    .update({
      status: 'open',
      first_due_on: conn.raw('COALESCE(first_due_on, due_on)'),
      due_on: dueOn,
    });
}

/** How many reports came since an instant: to the network, and of these from one address. */
export async function countReportAttempts(
  networkId: number,
  addressDigest: Buffer,
  since: Date,
  conn: Connection = pool(),
): Promise<{ ofNetwork: number; ofAddress: number }> {
  const row = await conn('report_attempts')
    .where({ network_id: networkId })
    .where('at', '>', since)
    .first(
      conn.raw('COUNT(*) AS of_network, COUNT(CASE WHEN address_digest = ? THEN 1 END) AS of_address', [
        addressDigest,
      ]),
    );
  return { ofNetwork: Number(row.of_network), ofAddress: Number(row.of_address) };
}

/** Remembers a report for the bounds, and forgets those that no longer count. */
export async function insertReportAttempt(
  networkId: number,
  addressDigest: Buffer,
  keptSince: Date,
  conn: Connection,
): Promise<void> {
  await conn('report_attempts').where({ network_id: networkId }).where('at', '<', keptSince).delete();
  await conn('report_attempts').insert({
    network_id: networkId,
    address_digest: addressDigest,
    at: new Date(),
  });
}
