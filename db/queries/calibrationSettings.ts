import { pool, type Connection } from './connection';

/** How a network checks its instruments. */
export interface CalibrationSettings {
  /** A drift beyond this, either way, makes data since the last good check doubtful. */
  driftBoundCentiDb: number;
  checkEveryDays: number;
  remindBeforeDays: number;
  /** E-mail addresses; empty: the operators of the network. */
  recipients: string[];
}

/** What holds until a network says otherwise: 0.5 dB (practice 0.5–1.0), a year, two weeks ahead. */
const DEFAULT_CALIBRATION_SETTINGS: CalibrationSettings = {
  driftBoundCentiDb: 50,
  checkEveryDays: 365,
  remindBeforeDays: 14,
  recipients: [],
};

export async function calibrationSettingsOf(
  networkId: number,
  conn: Connection = pool(),
): Promise<CalibrationSettings> {
  const row = await conn('calibration_settings').where({ network_id: networkId }).first({
    driftBoundCentiDb: 'drift_bound_centi_db',
    checkEveryDays: 'check_every_days',
    remindBeforeDays: 'remind_before_days',
    recipients: 'recipients',
  });
  return row ? { ...row, recipients: listOf(row.recipients) } : DEFAULT_CALIBRATION_SETTINGS;
}

export async function setCalibrationSettings(
  networkId: number,
  settings: CalibrationSettings,
  changedBy: string,
  conn: Connection,
): Promise<void> {
  const row = {
    network_id: networkId,
    drift_bound_centi_db: settings.driftBoundCentiDb,
    check_every_days: settings.checkEveryDays,
    remind_before_days: settings.remindBeforeDays,
    recipients: JSON.stringify(settings.recipients),
    changed_by: changedBy,
    changed_at: new Date(),
  };
  await conn('calibration_settings').insert(row).onConflict('network_id').merge();
}

/** E-mail addresses of a network's operators who may sign in. */
export async function operatorAddresses(networkId: number, conn: Connection = pool()): Promise<string[]> {
  return conn('memberships')
    .join('users', 'users.id', 'memberships.user_id')
    .where({ 'memberships.network_id': networkId, 'memberships.role': 'operator' })
    .whereNull('users.disabled_at')
    .orderBy('users.email')
    .pluck('users.email');
}

function listOf(cell: string | string[]): string[] {
  return typeof cell === 'string' ? (JSON.parse(cell) as string[]) : cell;
}
