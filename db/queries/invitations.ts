import { pool, type Connection } from './connection';
import { jsonOf } from './json';
import { type Role } from './users';

/** Somebody who is asked to join, with what he or she will be. */
export interface InvitationRow {
  id: number;
  email: string;
  name: string;
  isAdministrator: boolean;
  roles: { network: string; role: Role }[];
  createdBy: string;
  createdAt: Date;
  expiresAt: Date;
  mails: number;
  lastMailAt: Date | null;
}

const COLUMNS = {
  id: 'id',
  email: 'email',
  name: 'name',
  isAdministrator: 'is_administrator',
  roles: 'roles',
  createdBy: 'created_by',
  createdAt: 'created_at',
  expiresAt: 'expires_at',
  mails: 'mails',
  lastMailAt: 'last_mail_at',
} as const;

export type NewInvitation = Pick<
  InvitationRow,
  'email' | 'name' | 'isAdministrator' | 'roles' | 'createdBy' | 'createdAt' | 'expiresAt'
>;

export async function insertInvitation(invitation: NewInvitation, conn: Connection): Promise<number> {
  const [id] = await conn('invitations').insert({
    email: invitation.email,
    name: invitation.name,
    is_administrator: invitation.isAdministrator,
    roles: JSON.stringify(invitation.roles),
    created_by: invitation.createdBy,
    created_at: invitation.createdAt,
    expires_at: invitation.expiresAt,
  });
  return Number(id);
}

/** Invitations neither accepted nor withdrawn, latest first; those that have run out are among them. */
export async function listOpenInvitations(conn: Connection = pool()): Promise<InvitationRow[]> {
  const rows = await conn('invitations')
    .where({ accepted_at: null, withdrawn_at: null })
    .orderBy('id', 'desc')
    .select(COLUMNS);
  return rows.map(rowOf);
}

/** An invitation that is neither accepted nor withdrawn; in a transaction its row is locked until the end. */
export async function findOpenInvitation(id: number, conn: Connection): Promise<InvitationRow | undefined> {
  const row = await conn('invitations')
    .where({ id, accepted_at: null, withdrawn_at: null })
    .forUpdate()
    .first(COLUMNS);
  return row && rowOf(row);
}

/** The same by address; what is found, or not, is locked until the transaction ends. */
export async function findOpenInvitationByEmail(
  email: string,
  transaction: Connection,
): Promise<InvitationRow | undefined> {
  const row = await transaction('invitations')
    .where({ email, accepted_at: null, withdrawn_at: null })
    .forUpdate()
    .first(COLUMNS);
  return row && rowOf(row);
}

/** Notes that an invitation goes out, and until when it holds. */
export async function noteInvitationMail(
  id: number,
  { at, expiresAt }: { at: Date; expiresAt: Date },
  conn: Connection,
): Promise<void> {
  await conn('invitations')
    .where({ id })
    .update({ mails: conn.raw('mails + 1'), last_mail_at: at, expires_at: expiresAt });
}

/** Closes an invitation, one way or the other. */
export async function closeInvitation(
  id: number,
  how: 'accepted_at' | 'withdrawn_at',
  at: Date,
  conn: Connection,
): Promise<void> {
  await conn('invitations')
    .where({ id })
    .update({ [how]: at });
}

/** Forgets invitations that ran out before an instant, however they ended. */
export async function deleteInvitationsBefore(before: Date, conn: Connection = pool()): Promise<number> {
  return conn('invitations').where('expires_at', '<', before).delete();
}

function rowOf(row: InvitationRow & { isAdministrator: unknown; roles: unknown }): InvitationRow {
  return { ...row, isAdministrator: Boolean(row.isAdministrator), roles: jsonOf(row.roles) };
}
