import { pool, type Connection } from './connection';

export type Role = 'operator' | 'liaison' | 'regulator';

export interface UserRow {
  id: string;
  email: string;
  name: string;
  isAdministrator: boolean;
  /** Somebody else handed the password over: it opens nothing before it is changed. */
  mustChangePassword: boolean;
  createdAt: Date;
  disabledAt: Date | null;
}

export interface Membership {
  userId: string;
  networkId: number;
  role: Role;
}

const USER_COLUMNS = {
  id: 'id',
  email: 'email',
  name: 'name',
  isAdministrator: 'is_administrator',
  mustChangePassword: 'must_change_password',
  createdAt: 'created_at',
  disabledAt: 'disabled_at',
} as const;

export async function findUserById(id: string, conn: Connection = pool()): Promise<UserRow | undefined> {
  return userOf(await conn('users').where({ id }).first(USER_COLUMNS));
}

/** The person and the argon2 hash of the password, for signing in only. */
export async function findCredentials(
  email: string,
  conn: Connection = pool(),
): Promise<{ user: UserRow; passwordHash: string } | undefined> {
  const row = await conn('users')
    .where({ email })
    .first({ ...USER_COLUMNS, passwordHash: 'password_hash' });
  const user = userOf(row);
  return user && { user, passwordHash: row.passwordHash };
}

/** The same of a person by id. */
export async function findCredentialsById(
  id: string,
  conn: Connection = pool(),
): Promise<{ user: UserRow; passwordHash: string } | undefined> {
  const row = await conn('users')
    .where({ id })
    .first({ ...USER_COLUMNS, passwordHash: 'password_hash' });
  const user = userOf(row);
  return user && { user, passwordHash: row.passwordHash };
}

export async function listUsers(conn: Connection = pool()): Promise<UserRow[]> {
  const rows = await conn('users').orderBy('name').select(USER_COLUMNS);
  return rows.flatMap((row) => userOf(row) ?? []);
}

export interface NewUser {
  id: string;
  email: string;
  name: string;
  passwordHash: string;
  isAdministrator: boolean;
  /** Left out: chosen by the person. */
  mustChangePassword?: boolean;
}

/** Adds a person. An address that is known already fails with MariaDB's duplicate-key error. */
export async function insertUser(user: NewUser, conn: Connection): Promise<void> {
  await conn('users').insert({
    id: user.id,
    email: user.email,
    name: user.name,
    password_hash: user.passwordHash,
    is_administrator: user.isAdministrator,
    must_change_password: user.mustChangePassword ?? false,
    created_at: new Date(),
  });
}

/** Roles that a person holds, network by network. */
export async function listMemberships(userId: string, conn: Connection = pool()): Promise<Membership[]> {
  return conn('memberships')
    .where({ user_id: userId })
    .select({ userId: 'user_id', networkId: 'network_id', role: 'role' });
}

export async function insertMembership(membership: Membership, conn: Connection): Promise<void> {
  await conn('memberships').insert({
    user_id: membership.userId,
    network_id: membership.networkId,
    role: membership.role,
    created_at: new Date(),
  });
}

export async function deleteMembership(membership: Membership, conn: Connection): Promise<void> {
  const { userId, networkId, role } = membership;
  await conn('memberships').where({ user_id: userId, network_id: networkId, role }).delete();
}

/** Every role of every person. */
export async function listAllMemberships(conn: Connection = pool()): Promise<Membership[]> {
  return conn('memberships').select({ userId: 'user_id', networkId: 'network_id', role: 'role' });
}

/** Changes a person's entry; what is left out stays. */
export async function updateUser(
  id: string,
  changes: {
    name?: string;
    isAdministrator?: boolean;
    passwordHash?: string;
    mustChangePassword?: boolean;
    disabledAt?: Date | null;
  },
  conn: Connection,
): Promise<void> {
  const columns = {
    name: changes.name,
    is_administrator: changes.isAdministrator,
    password_hash: changes.passwordHash,
    must_change_password: changes.mustChangePassword,
    disabled_at: changes.disabledAt,
  };
  const given = Object.fromEntries(Object.entries(columns).filter(([, value]) => value !== undefined));
  if (Object.keys(given).length > 0) await conn('users').where({ id }).update(given);
}

/** Administrators who may sign in; their rows are locked until the transaction ends, so that two changes cannot remove the last two. */
export async function lockAdministrators(transaction: Connection): Promise<string[]> {
  return transaction('users')
    .where({ is_administrator: true })
    .whereNull('disabled_at')
    .forUpdate()
    .pluck('id');
}

function userOf(
  row:
    | (Omit<UserRow, 'isAdministrator' | 'mustChangePassword'> & {
        isAdministrator: unknown;
        mustChangePassword: unknown;
      })
    | undefined,
): UserRow | undefined {
  return (
    row && {
      id: row.id,
      email: row.email,
      name: row.name,
      isAdministrator: Boolean(row.isAdministrator),
      mustChangePassword: Boolean(row.mustChangePassword),
      createdAt: row.createdAt,
      disabledAt: row.disabledAt,
    }
  );
}
