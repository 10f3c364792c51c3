import { pool, type Connection } from './connection';
import type { Role } from './users';

/** How a person wants to be told of a network's exceedances. Times are the network's civil time. */
export interface AlertPreferences {
  delivery: 'at-once' | 'hourly' | 'daily';
  /** Minutes after midnight at which the daily digest is sent. */
  dailyAtMin: number;
  /** Least minutes between two messages: what comes meanwhile goes into one. */
  groupMin: number;
  /** Minutes after midnight, `from <= t < to`, over midnight where `to` is earlier; both null: no quiet hours. */
  quietFromMin: number | null;
  quietToMin: number | null;
  /** Tenths of a dB above the limit from which neither digest nor quiet hours hold it back; null: they always do. */
  overrideTenths: number | null;
  /** Null: every station. */
  stationIds: number[] | null;
  /** Whether to write while a window is still open and heading above its limit. */
  warnsEarly: boolean;
}

/** What holds for a person who has not said otherwise: everything, at once, a burst as one message. */
export const DEFAULT_PREFERENCES: AlertPreferences = {
  delivery: 'at-once',
  dailyAtMin: 7 * 60,
  groupMin: 5,
  quietFromMin: null,
  quietToMin: null,
  overrideTenths: null,
  stationIds: null,
  warnsEarly: false,
};

/** Somebody with an account who may enter a network. */
export interface AlertPerson {
  userId: string;
  email: string;
  name: string;
  isOperator: boolean;
  preferences: AlertPreferences;
}

const PREFERENCE_COLUMNS = {
  delivery: 'p.delivery',
  dailyAtMin: 'p.daily_at_min',
  groupMin: 'p.group_min',
  quietFromMin: 'p.quiet_from_min',
  quietToMin: 'p.quiet_to_min',
  overrideTenths: 'p.override_tenths',
  stationIds: 'p.station_ids',
  warnsEarly: 'p.warns_early',
} as const;

type PreferenceRow = { [K in keyof AlertPreferences]: unknown };

/** People who may sign in and enter a network, by name: its members and the administrators. */
export async function listAlertPeople(networkId: number, conn: Connection = pool()): Promise<AlertPerson[]> {
  const [people, members] = await Promise.all([
    conn('users as u')
      .leftJoin('alert_preferences as p', (join) =>
        join.on('p.user_id', 'u.id').andOnVal('p.network_id', networkId),
      )
      .whereNull('u.disabled_at')
      .where((query) =>
        query
          .where('u.is_administrator', true)
          .orWhereIn('u.id', conn('memberships').where({ network_id: networkId }).select('user_id')),
      )
      .orderBy(['u.name', 'u.id'])
      .select<(PreferenceRow & { userId: string; email: string; name: string; isAdministrator: unknown })[]>({
        userId: 'u.id',
        email: 'u.email',
        name: 'u.name',
        isAdministrator: 'u.is_administrator',
        ...PREFERENCE_COLUMNS,
      }),
    conn('memberships')
      .where({ network_id: networkId, role: 'operator' satisfies Role })
      .pluck<string[]>('user_id'),
  ]);
  const operators = new Set(members);
  return people.map(({ userId, email, name, isAdministrator, ...row }) => ({
    userId,
    email,
    name,
    isOperator: Boolean(isAdministrator) || operators.has(userId),
    preferences: preferencesOf(row),
  }));
}

/** Networks where somebody wants early warnings. */
export async function listWarnedNetworks(conn: Connection = pool()): Promise<number[]> {
  return conn('alert_preferences').where({ warns_early: true }).distinct('network_id').pluck('network_id');
}

export async function findAlertPreferences(
  networkId: number,
  userId: string,
  conn: Connection = pool(),
): Promise<AlertPreferences> {
  const row: PreferenceRow | undefined = await conn('alert_preferences as p')
    .where({ 'p.network_id': networkId, 'p.user_id': userId })
    .first(PREFERENCE_COLUMNS);
  return row ? preferencesOf(row) : DEFAULT_PREFERENCES;
}

export async function setAlertPreferences(
  { networkId, userId }: { networkId: number; userId: string },
  preferences: AlertPreferences,
  conn: Connection,
): Promise<void> {
  const row = {
    network_id: networkId,
    user_id: userId,
    delivery: preferences.delivery,
    daily_at_min: preferences.dailyAtMin,
    group_min: preferences.groupMin,
    quiet_from_min: preferences.quietFromMin,
    quiet_to_min: preferences.quietToMin,
    override_tenths: preferences.overrideTenths,
    station_ids: preferences.stationIds && JSON.stringify(preferences.stationIds),
    warns_early: preferences.warnsEarly,
    changed_at: new Date(),
  };
  await conn('alert_preferences').insert(row).onConflict(['network_id', 'user_id']).merge();
}

function preferencesOf(row: PreferenceRow): AlertPreferences {
  if (row.delivery === null) return DEFAULT_PREFERENCES;
  const { stationIds } = row;
  return {
    ...(row as AlertPreferences),
    stationIds: typeof stationIds === 'string' ? JSON.parse(stationIds) : (stationIds as number[] | null),
    warnsEarly: Boolean(row.warnsEarly),
  };
}
