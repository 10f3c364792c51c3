import type { PeriodScheme } from '#lib/acoustics/dayEveningNight';
import type { ValidityRules } from '#lib/acoustics/validity';
import { pool, type Connection } from './connection';

export interface NetworkRow {
  id: number;
  slug: string;
  name: string;
}

/** What holds for a network from an instant on. A change is a new row: it never rewrites history by itself. */
export interface NetworkSettings {
  effectiveFromSec: number;
  timeZone: string;
  scheme: PeriodScheme;
  minimumCoverage: number;
  rules: ValidityRules;
}

const NETWORK_COLUMNS = ['id', 'slug', 'name'] as const;

export async function findNetworkBySlug(
  slug: string,
  conn: Connection = pool(),
): Promise<NetworkRow | undefined> {
  return conn('networks')
    .where({ slug })
    .first(...NETWORK_COLUMNS);
}

export async function findNetworkById(
  id: number,
  conn: Connection = pool(),
): Promise<NetworkRow | undefined> {
  return conn('networks')
    .where({ id })
    .first(...NETWORK_COLUMNS);
}

/** Every network, by name. */
export async function listNetworks(conn: Connection = pool()): Promise<NetworkRow[]> {
  return conn('networks')
    .select(...NETWORK_COLUMNS)
    .orderBy('name');
}

/** Adds a network without settings; `insertSettings` belongs in the same transaction. */
export async function insertNetwork(network: Omit<NetworkRow, 'id'>, conn: Connection): Promise<number> {
  const [id] = await conn('networks').insert({ ...network, created_at: new Date() });
  return Number(id);
}

export async function renameNetwork(id: number, name: string, conn: Connection): Promise<void> {
  await conn('networks').where({ id }).update({ name });
}

/** Ids of networks that let nobody in from a browser without a second factor. */
export async function listSecondFactorNetworks(conn: Connection = pool()): Promise<number[]> {
  return conn('networks').where({ second_factor_required: true }).pluck('id');
}

/** Whether a network asks for a second factor from now on; answers whether that is a change. */
export async function requireSecondFactor(
  id: number,
  isRequired: boolean,
  conn: Connection,
): Promise<boolean> {
  const changed = await conn('networks')
    .where({ id, second_factor_required: !isRequired })
    .update({ second_factor_required: isRequired });
  return changed > 0;
}

/** Adds settings from `effectiveFromSec` on, or replaces those that begin at that very instant. */
export async function insertSettings(
  networkId: number,
  settings: NetworkSettings,
  createdBy: string | null,
  conn: Connection,
): Promise<void> {
  const row = {
    network_id: networkId,
    effective_from: settings.effectiveFromSec,
    time_zone: settings.timeZone,
    day_start_min: settings.scheme.dayStartMin,
    evening_start_min: settings.scheme.eveningStartMin,
    night_start_min: settings.scheme.nightStartMin,
    minimum_coverage: settings.minimumCoverage,
    maximum_wind_speed_ms: settings.rules.maximumWindSpeedMs,
    exclude_rain: settings.rules.excludeRain,
    created_by: createdBy,
    created_at: new Date(),
  };
  await conn('network_settings').insert(row).onConflict(['network_id', 'effective_from']).merge();
}

/** Settings of a network in order of their beginning. */
export async function listSettings(networkId: number, conn: Connection = pool()): Promise<NetworkSettings[]> {
  const rows: SettingsRow[] = await conn('network_settings')
    .where({ network_id: networkId })
    .orderBy('effective_from');
  return rows.map(settingsOfRow);
}

/**
 * Settings in force at an instant (epoch seconds). Before the first row the first row holds: data may be older than
 * the network's entry.
 */
export async function settingsAt(
  networkId: number,
  atSec: number,
  conn: Connection = pool(),
): Promise<NetworkSettings> {
  return pickSettings(await listSettings(networkId, conn), atSec);
}

/** Of settings in order of their beginning, those in force at an instant. */
export function pickSettings(ordered: NetworkSettings[], atSec: number): NetworkSettings {
  const inForce = ordered.filter((settings) => settings.effectiveFromSec <= atSec).at(-1) ?? ordered[0];
  if (!inForce) throw new Error('The network has no settings.');
  return inForce;
}

interface SettingsRow {
  effective_from: number;
  time_zone: string;
  day_start_min: number;
  evening_start_min: number | null;
  night_start_min: number;
  minimum_coverage: number;
  maximum_wind_speed_ms: number;
  exclude_rain: number;
}

function settingsOfRow(row: SettingsRow): NetworkSettings {
  return {
    effectiveFromSec: row.effective_from,
    timeZone: row.time_zone,
    scheme: {
      dayStartMin: row.day_start_min,
      eveningStartMin: row.evening_start_min,
      nightStartMin: row.night_start_min,
    },
    minimumCoverage: row.minimum_coverage,
    rules: { maximumWindSpeedMs: row.maximum_wind_speed_ms, excludeRain: row.exclude_rain === 1 },
  };
}
