import type {
  ClosingReason,
  ComplaintKind,
  ComplaintSource,
  ComplaintStatus,
} from '#lib/contracts/complaints';
import type { LocalDate } from '#lib/time/zone';
import { pool, type Connection } from './connection';

/** A complaint without anything personal. */
export interface ComplaintRow {
  id: number;
  networkId: number;
  reference: string;
  /** Half-open window, epoch seconds. */
  startsAtSec: number;
  endsAtSec: number;
  kind: ComplaintKind;
  /** Rounded to the step of the network's settings, at least 0.01 degree; null where no place is known, or none is told. */
  coarseLatitude: number | null;
  coarseLongitude: number | null;
  nearestStationId: number | null;
  nearestStationCode: string | null;
  /** Of the network's list, where one was chosen. */
  area: string | null;
  status: ComplaintStatus;
  source: ComplaintSource;
  dueOn: LocalDate;
  assignedTo: string | null;
  assignedToName: string | null;
  createdAt: Date;
  answeredAt: Date | null;
  closedAt: Date | null;
  closingReason: ClosingReason | null;
  /** Reference of the complaint that this one repeats. */
  mergedInto: string | null;
}

export type NewComplaintRow = Pick<
  ComplaintRow,
  | 'networkId'
  | 'reference'
  | 'startsAtSec'
  | 'endsAtSec'
  | 'kind'
  | 'coarseLatitude'
  | 'coarseLongitude'
  | 'nearestStationId'
  | 'area'
  | 'source'
  | 'dueOn'
> & { createdBy: string | null };

/** The next number of a prefix and year. Locks that counter until the transaction ends; a number is never given twice. */
export async function nextComplaintNumber(prefix: string, year: number, conn: Connection): Promise<number> {
  await conn.raw(
    `INSERT INTO complaint_numbers (prefix, year, last_number) VALUES (?, ?, 1)
     ON DUPLICATE KEY UPDATE last_number = last_number + 1`,
    [prefix, year],
  );
  const row = await conn('complaint_numbers').where({ prefix, year }).first('last_number');
  return Number(row.last_number);
}

export async function insertComplaint(complaint: NewComplaintRow, conn: Connection): Promise<number> {
  const [id] = await conn('complaints').insert({
    network_id: complaint.networkId,
    reference: complaint.reference,
    starts_at: complaint.startsAtSec,
    ends_at: complaint.endsAtSec,
    kind: complaint.kind,
    coarse_latitude: complaint.coarseLatitude,
    coarse_longitude: complaint.coarseLongitude,
    nearest_station_id: complaint.nearestStationId,
    area: complaint.area,
    source: complaint.source,
    due_on: complaint.dueOn,
    created_by: complaint.createdBy,
    created_at: new Date(),
  });
  return Number(id);
}

export async function findComplaint(
  networkId: number,
  reference: string,
  conn: Connection = pool(),
): Promise<ComplaintRow | undefined> {
  return selectComplaints(conn).where({ 'c.network_id': networkId, 'c.reference': reference }).first();
}

/** The same, locked until the transaction ends, so that of two people who answer at once the second sees the first. */
export async function lockComplaint(
  networkId: number,
  reference: string,
  conn: Connection,
): Promise<ComplaintRow | undefined> {
  await conn('complaints').where({ network_id: networkId, reference }).forUpdate().first('id');
  return findComplaint(networkId, reference, conn);
}

export interface ComplaintFilter {
  status?: ComplaintStatus;
  /** Windows that overlap `fromSec <= t < toSec`. */
  fromSec?: number;
  toSec?: number;
  nearestStationId?: number;
  /** Code of the nearest station. */
  station?: string;
  area?: string;
  kind?: ComplaintKind;
  source?: ComplaintSource;
  /** A person, or `nobody`: not assigned. */
  assignedTo?: string;
  /** Open ones whose due date is before this. */
  dueBefore?: LocalDate;
  /** Those whose answer waits for a second person. */
  isAnswerSubmitted?: boolean;
  /** Part of the reference. */
  reference?: string;
  /** Goes on behind this one. */
  after?: { dueOn: LocalDate; id: number };
  limit: number;
}

/** Complaints by due date, then in the order in which they were logged. */
export async function listComplaints(
  networkId: number,
  filter: ComplaintFilter,
  conn: Connection = pool(),
): Promise<ComplaintRow[]> {
  const query = narrowed(selectComplaints(conn).where({ 'c.network_id': networkId }), filter);
  if (filter.after) {
    const { dueOn, id } = filter.after;
    void query.whereRaw('(c.due_on, c.id) > (?, ?)', [dueOn, id]);
  }
  return query.orderBy(['c.due_on', 'c.id']).limit(filter.limit);
}

/** Narrows a query by everything of a filter but where it goes on. */
function narrowed(
  query: ReturnType<typeof selectComplaints>,
  filter: Omit<ComplaintFilter, 'after' | 'limit'>,
) {
  const equal = {
    'c.status': filter.status,
    'c.nearest_station_id': filter.nearestStationId,
    's.code': filter.station,
    'c.area': filter.area,
    'c.kind': filter.kind,
    'c.source': filter.source,
  };
  for (const [column, value] of Object.entries(equal))
    if (value !== undefined) void query.where(column, value);
  if (filter.assignedTo === 'nobody') void query.whereNull('c.assigned_to');
  else if (filter.assignedTo !== undefined) void query.where('c.assigned_to', filter.assignedTo);
  if (filter.toSec !== undefined) void query.where('c.starts_at', '<', filter.toSec);
  if (filter.fromSec !== undefined) void query.where('c.ends_at', '>', filter.fromSec);
  if (filter.dueBefore !== undefined)
    void query.where({ 'c.status': 'open' }).where('c.due_on', '<', filter.dueBefore);
  if (filter.isAnswerSubmitted)
    void query.whereIn('c.id', (submitted) =>
      submitted.from('complaint_answers').where({ state: 'submitted' }).select('complaint_id'),
    );
  if (filter.reference !== undefined)
    void query.whereRaw('LOCATE(?, LOWER(c.reference)) > 0', [filter.reference.toLowerCase()]);
  return query;
}

/** Complaints of a network by their numbers, latest noise first. */
export async function listComplaintsById(
  networkId: number,
  ids: readonly number[],
  conn: Connection = pool(),
): Promise<ComplaintRow[]> {
  return selectComplaints(conn)
    .where({ 'c.network_id': networkId })
    .whereIn('c.id', ids)
    .orderBy(['c.starts_at', 'c.id'].map((column) => ({ column, order: 'desc' })));
}

/** Complaints that were merged into one, oldest first. */
export async function listMergedInto(id: number, conn: Connection = pool()): Promise<ComplaintRow[]> {
  return selectComplaints(conn).where({ 'c.merged_into': id }).orderBy('c.id');
}

export interface ComplaintCounts {
  open: number;
  overdue: number;
  answered: number;
  closed: number;
}

/** How many stand where; `today` decides what is overdue. */
export async function countByStatus(
  networkId: number,
  today: LocalDate,
  conn: Connection = pool(),
): Promise<ComplaintCounts> {
  const row = await conn('complaints')
    .where({ network_id: networkId })
    .first(
      conn.raw(
        `COUNT(CASE WHEN status = 'open' THEN 1 END) AS open,
         COUNT(CASE WHEN status = 'open' AND due_on < ? THEN 1 END) AS overdue,
         COUNT(CASE WHEN status = 'answered' THEN 1 END) AS answered,
         COUNT(CASE WHEN status = 'closed' THEN 1 END) AS closed`,
        [today],
      ),
    );
  return {
    open: Number(row.open),
    overdue: Number(row.overdue),
    answered: Number(row.answered),
    closed: Number(row.closed),
  };
}

/** Complaints whose window begins within `fromSec <= t < toSec`, counted by how they stand now. */
export async function countOfWindowsWithin(
  networkId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<Record<ComplaintStatus, number>> {
  const rows: { status: ComplaintStatus; count: number }[] = await conn('complaints')
    .where({ network_id: networkId })
    .where('starts_at', '>=', fromSec)
    .where('starts_at', '<', toSec)
    .groupBy('status')
    .select('status')
    .count({ count: '*' });
  const count = (status: ComplaintStatus) => Number(rows.find((row) => row.status === status)?.count ?? 0);
  return { open: count('open'), answered: count('answered'), closed: count('closed') };
}

/** Marks it answered; the first answer's time stays. */
export async function markAnswered(id: number, at: Date, conn: Connection): Promise<void> {
  await conn('complaints')
    .where({ id })
    .update({ status: 'answered', answered_at: conn.raw('COALESCE(answered_at, ?)', [at]) });
}

export async function markClosed(
  id: number,
  reason: ClosingReason,
  at: Date,
  conn: Connection,
): Promise<void> {
  await conn('complaints').where({ id }).update({ status: 'closed', closed_at: at, closing_reason: reason });
}

function selectComplaints(conn: Connection) {
  return conn('complaints as c')
    .leftJoin('stations as s', 's.id', 'c.nearest_station_id')
    .leftJoin('users as a', 'a.id', 'c.assigned_to')
    .leftJoin('complaints as m', 'm.id', 'c.merged_into')
    .leftJoin('complaint_settings as st', 'st.network_id', 'c.network_id')
    .select({
      id: 'c.id',
      networkId: 'c.network_id',
      reference: 'c.reference',
      startsAtSec: 'c.starts_at',
      endsAtSec: 'c.ends_at',
      kind: 'c.kind',
      coarseLatitude: conn.raw(toldDegrees('c.coarse_latitude')),
      coarseLongitude: conn.raw(toldDegrees('c.coarse_longitude')),
      nearestStationId: 'c.nearest_station_id',
      nearestStationCode: 's.code',
      area: 'c.area',
      status: 'c.status',
      source: 'c.source',
      // A DATE would come out as an instant.
      dueOn: conn.raw(`DATE_FORMAT(c.due_on, '%Y-%m-%d')`),
      assignedTo: 'c.assigned_to',
      assignedToName: 'a.name',
      createdAt: 'c.created_at',
      answeredAt: 'c.answered_at',
      closedAt: 'c.closed_at',
      closingReason: 'c.closing_reason',
      mergedInto: 'm.reference',
    });
}

/** Degrees rounded to the step that the network tells; none where it tells no place. */
function toldDegrees(column: string): string {
  const step = 'COALESCE(st.place_step_hundredths, 1)';
  return `IF(${step} = 0, NULL, ROUND(ROUND(${column} * 100 / ${step}) * ${step} / 100, 2))`;
}
