import type {
  ClosingReason,
  ComplaintKind,
  ComplaintSource,
  ComplaintStatus,
} from '#lib/contracts/complaints';
import type { LocalDate } from '#lib/time/zone';
import { pool, type Connection } from './connection';

/** What is counted of a complaint; nothing of it is personal. */
export interface CountedComplaint {
  startsAtSec: number;
  kind: ComplaintKind;
  area: string | null;
  stationCode: string | null;
  source: ComplaintSource;
  status: ComplaintStatus;
  closingReason: ClosingReason | null;
  createdAt: Date;
  answeredAt: Date | null;
  /** When the first answer was due. */
  firstDueOn: LocalDate;
  /** A limit stands exceeded at the nearest station within its window. */
  hasExceedance: boolean;
}

/** Complaints of a network whose windows begin within `fromSec <= t < toSec`, in order of time. */
export async function listCounted(
  networkId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  conn: Connection = pool(),
): Promise<CountedComplaint[]> {
  const exceedance = conn('exceedances as e')
    .whereRaw('e.station_id = c.nearest_station_id')
    .where({ 'e.state': 'standing' })
    .whereRaw('e.starts_at < c.ends_at AND e.ends_at > c.starts_at');
  const rows = await conn('complaints as c')
    .leftJoin('stations as s', 's.id', 'c.nearest_station_id')
    .where({ 'c.network_id': networkId })
    .where('c.starts_at', '>=', fromSec)
    .where('c.starts_at', '<', toSec)
    .orderBy(['c.starts_at', 'c.id'])
    .select({
      startsAtSec: 'c.starts_at',
      kind: 'c.kind',
      area: 'c.area',
      stationCode: 's.code',
      source: 'c.source',
      status: 'c.status',
      closingReason: 'c.closing_reason',
      createdAt: 'c.created_at',
      answeredAt: 'c.answered_at',
      firstDueOn: conn.raw(`DATE_FORMAT(COALESCE(c.first_due_on, c.due_on), '%Y-%m-%d')`),
      hasExceedance: conn.raw('EXISTS ?', [exceedance.clone().select(conn.raw('1'))]),
    });
  return rows.map((row) => ({ ...row, hasExceedance: Number(row.hasExceedance) === 1 }));
}
