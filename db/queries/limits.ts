import type { BandFraction } from '#lib/acoustics/bands';
import type { LimitMetricName, LimitWindowName } from '#lib/acoustics/limitQuantities';
import type { WindRule } from '#lib/acoustics/windRule';
import { pool, type Connection } from './connection';
import { listHolidays } from './holidays';

export type LimitMetric = LimitMetricName;
export type LimitAveraging = LimitWindowName;
/** What the named dates of the network are to a limit: nothing, Sundays, left out, or the only dates. */
export type HolidayRule = 'as-weekday' | 'as-sunday' | 'never' | 'only';

/** One version of a limit. A window is judged by the version in force when it begins. */
export interface LimitVersion {
  id: number;
  limitId: number;
  networkId: number;
  version: number;
  effectiveFromSec: number;
  name: string;
  metric: LimitMetric;
  averaging: LimitAveraging;
  /** Minutes of a window of averaging `length`, else null. */
  windowMin: number | null;
  /** Rolling windows begin every so many minutes of the clock; null: fixed windows. */
  stepMin: number | null;
  /** Of a band limit, else null. */
  bandFraction: BandFraction | null;
  bandIndex: number | null;
  /** N of an L_N limit, or of the background that a level is above (null: 90); else null. */
  percent: number | null;
  /** Of a group of bands, which begins with `bandIndex`, the last one; else null. */
  bandToIndex: number | null;
  /** Of a limit on events: what an event is above, and how long it is at least; else null. */
  eventTenths: number | null;
  eventMinimumSec: number | null;
  /** Gaps up to this long do not end an event; null: 10 s. */
  eventGapSec: number | null;
  /** Hours, minutes after midnight, that the background is taken from; null: the window itself. */
  backgroundFromMin: number | null;
  backgroundToMin: number | null;
  /** Exceeded when the level, rounded half up to tenths of a dB, is greater. */
  thresholdTenths: number;
  /** Bit 0 Monday … bit 6 Sunday, of the local date on which the window begins. */
  weekdays: number;
  holidays: HolidayRule;
  /** The named dates of the network as they are now. */
  holidayDates: ReadonlySet<string>;
  /**
   * Local clock, minutes after midnight, between which a window must begin, or which are the window; null: all day. `toMin` before
   * `fromMin`: across midnight.
   */
  fromMin: number | null;
  toMin: number | null;
  /** Null: the network's minimum. */
  minimumCoverage: number | null;
  /** Beside the network's bound on wind; null: none. */
  windRule: WindRule | null;
  /** Null: every station of the network. */
  stationIds: number[] | null;
  /** The group that the stations were taken from, else null. */
  groupId: number | null;
  recipients: string[];
  reason: string;
  createdBy: string | null;
  createdAt: Date;
  /** When the limit itself was withdrawn. */
  withdrawnAt: Date | null;
}

type Assigned = 'id' | 'limitId' | 'networkId' | 'version' | 'createdAt' | 'withdrawnAt' | 'holidayDates';
/** What is left out of these is as it is without: fixed windows, named dates like any other, no parameter of its quantity. */
type Optional =
  | 'windowMin'
  | 'stepMin'
  | 'holidays'
  | 'percent'
  | 'bandToIndex'
  | 'eventTenths'
  | 'eventMinimumSec'
  | 'eventGapSec'
  | 'backgroundFromMin'
  | 'backgroundToMin'
  | 'windRule'
  | 'groupId';
export type NewLimitVersion = Omit<LimitVersion, Assigned | Optional> & Partial<Pick<LimitVersion, Optional>>;

interface Row extends Omit<LimitVersion, 'stationIds' | 'recipients' | 'holidayDates' | 'windRule'> {
  windRule: string | WindRule | null;
  stationIds: string | number[] | null;
  recipients: string | string[];
}

/** Every version of a network's limits, of each limit the oldest first; withdrawn limits too. */
export async function listLimitVersions(
  networkId: number,
  conn: Connection = pool(),
): Promise<LimitVersion[]> {
  const rows: Row[] = await selectVersions(conn).where({ 'l.network_id': networkId });
  return versionsOf(rows, networkId, conn);
}

/** The versions of one limit of a network, oldest first; empty when the network has no such limit. */
export async function findLimit(
  networkId: number,
  limitId: number,
  conn: Connection = pool(),
): Promise<LimitVersion[]> {
  const rows: Row[] = await selectVersions(conn).where({ 'l.network_id': networkId, 'l.id': limitId });
  return versionsOf(rows, networkId, conn);
}

/**
 * Locks limits until the transaction ends: who judges by them and who changes them take turns. Afterwards reads of a
 * read-committed transaction see what the other one did.
 */
export async function lockLimits(limitIds: Iterable<number>, transaction: Connection): Promise<void> {
  await transaction('limits')
    .whereIn('id', [...limitIds])
    .orderBy('id')
    .forUpdate()
    .select('id');
}

/** A version with who made it, and with who withdrew the limit and why. */
export interface LimitRecord extends LimitVersion {
  createdByName: string | null;
  withdrawnByName: string | null;
  withdrawalReason: string | null;
  /** As the group is called now. */
  groupName: string | null;
}

/** As `listLimitVersions`, or of one limit of the network only, with names and reasons for people. */
export async function listLimitRecords(
  networkId: number,
  limitId: number | null = null,
  conn: Connection = pool(),
): Promise<LimitRecord[]> {
  const rows: (Row & Omit<LimitRecord, keyof LimitVersion>)[] = await selectVersions(conn)
    .leftJoin({ creator: 'users' }, 'creator.id', 'v.created_by')
    .leftJoin({ withdrawer: 'users' }, 'withdrawer.id', 'l.withdrawn_by')
    .leftJoin({ g: 'station_groups' }, 'g.id', 'v.group_id')
    .where({ 'l.network_id': networkId, ...(limitId === null ? {} : { 'l.id': limitId }) })
    .select({
      createdByName: 'creator.name',
      withdrawnByName: 'withdrawer.name',
      withdrawalReason: 'l.withdrawal_reason',
      groupName: 'g.name',
    });
  return versionsOf(rows, networkId, conn);
}

/** Adds a limit with its first version and answers its id. */
export async function insertLimit(
  networkId: number,
  version: NewLimitVersion,
  conn: Connection,
): Promise<number> {
  const [id] = await conn('limits').insert({ network_id: networkId, created_at: new Date() });
  await insertVersion(Number(id), 1, version, conn);
  return Number(id);
}

/** Adds the next version of a limit. */
export async function insertVersion(
  limitId: number,
  version: number,
  fields: NewLimitVersion,
  conn: Connection,
): Promise<void> {
  await conn('limit_versions').insert({
    limit_id: limitId,
    version,
    effective_from: fields.effectiveFromSec,
    name: fields.name,
    metric: fields.metric,
    averaging: fields.averaging,
    window_min: fields.windowMin ?? null,
    step_min: fields.stepMin ?? null,
    band_fraction: fields.bandFraction,
    band_index: fields.bandIndex,
    percent: fields.percent ?? null,
    band_to_index: fields.bandToIndex ?? null,
    event_tenths: fields.eventTenths ?? null,
    event_minimum_sec: fields.eventMinimumSec ?? null,
    event_gap_sec: fields.eventGapSec ?? null,
    background_from_min: fields.backgroundFromMin ?? null,
    background_to_min: fields.backgroundToMin ?? null,
    threshold_tenths: fields.thresholdTenths,
    weekdays: fields.weekdays,
    holidays: fields.holidays ?? 'as-weekday',
    from_min: fields.fromMin,
    to_min: fields.toMin,
    minimum_coverage: fields.minimumCoverage,
    wind_rule: fields.windRule ? JSON.stringify(fields.windRule) : null,
    station_ids: fields.stationIds && JSON.stringify(fields.stationIds),
    group_id: fields.groupId ?? null,
    recipients: JSON.stringify(fields.recipients),
    reason: fields.reason,
    created_by: fields.createdBy,
    created_at: new Date(),
  });
}

/** Withdraws a limit: windows that begin from now on are not judged by it. Answers whether it stood. */
export async function withdrawLimit(
  limitId: number,
  { by, reason }: { by: string; reason: string },
  conn: Connection,
): Promise<boolean> {
  const changed = await conn('limits')
    .where({ id: limitId, withdrawn_at: null })
    .update({ withdrawn_at: new Date(), withdrawn_by: by, withdrawal_reason: reason });
  return changed > 0;
}

function selectVersions(conn: Connection) {
  return conn('limit_versions as v')
    .join('limits as l', 'l.id', 'v.limit_id')
    .orderBy(['v.limit_id', 'v.version'])
    .select({
      id: 'v.id',
      limitId: 'v.limit_id',
      networkId: 'l.network_id',
      version: 'v.version',
      effectiveFromSec: 'v.effective_from',
      name: 'v.name',
      metric: 'v.metric',
      averaging: 'v.averaging',
      windowMin: 'v.window_min',
      stepMin: 'v.step_min',
      bandFraction: 'v.band_fraction',
      bandIndex: 'v.band_index',
      percent: 'v.percent',
      bandToIndex: 'v.band_to_index',
      eventTenths: 'v.event_tenths',
      eventMinimumSec: 'v.event_minimum_sec',
      eventGapSec: 'v.event_gap_sec',
      backgroundFromMin: 'v.background_from_min',
      backgroundToMin: 'v.background_to_min',
      thresholdTenths: 'v.threshold_tenths',
      weekdays: 'v.weekdays',
      holidays: 'v.holidays',
      fromMin: 'v.from_min',
      toMin: 'v.to_min',
      minimumCoverage: 'v.minimum_coverage',
      windRule: 'v.wind_rule',
      stationIds: 'v.station_ids',
      groupId: 'v.group_id',
      recipients: 'v.recipients',
      reason: 'v.reason',
      createdBy: 'v.created_by',
      createdAt: 'v.created_at',
      withdrawnAt: 'l.withdrawn_at',
    });
}

async function versionsOf<R extends Row>(rows: readonly R[], networkId: number, conn: Connection) {
  const holidayDates: ReadonlySet<string> = new Set(
    (await listHolidays(networkId, conn)).map(({ date }) => date),
  );
  return rows.map((row) => ({
    ...row,
    windRule: parsed<WindRule | null>(row.windRule),
    stationIds: parsed<number[] | null>(row.stationIds),
    recipients: parsed<string[]>(row.recipients),
    holidayDates,
  }));
}

/** The driver gives JSON columns as text or parsed, depending on the server's version. */
function parsed<T>(value: string | T): T {
  return typeof value === 'string' ? (JSON.parse(value) as T) : value;
}
