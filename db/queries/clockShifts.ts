import { pool, type Connection } from './connection';

export type ClockShiftState = 'moving' | 'moved' | 'reversing' | 'reversed';

/** Which intervals of a station an episode of a wrong clock is, and how far they move. Half-open, epoch seconds. */
export interface ClockEpisode {
  fromSec: number;
  toSec: number;
  /** Added to each start. */
  shiftSec: number;
  /** Intervals that came before are not of the episode. */
  receivedFromSec: number;
}

export interface ClockShiftRow extends ClockEpisode {
  id: number;
  networkId: number;
  stationId: number;
  reason: string;
  state: ClockShiftState;
  plannedCount: number;
  movedCount: number;
  asideCount: number;
  problem: string | null;
  createdAt: Date;
  createdByName: string | null;
  reversedByName: string | null;
  reversalReason: string | null;
  finishedAt: Date | null;
}

const COLUMNS = {
  id: 's.id',
  networkId: 's.network_id',
  stationId: 's.station_id',
  fromSec: 's.from_sec',
  toSec: 's.to_sec',
  shiftSec: 's.shift_sec',
  receivedFromSec: 's.received_from_sec',
  reason: 's.reason',
  state: 's.state',
  plannedCount: 's.planned_count',
  movedCount: 's.moved_count',
  asideCount: 's.aside_count',
  problem: 's.problem',
  createdAt: 's.created_at',
  createdByName: 'creator.name',
  reversedByName: 'reverser.name',
  reversalReason: 's.reversal_reason',
  finishedAt: 's.finished_at',
} as const;

function selectShifts(conn: Connection) {
  return conn({ s: 'clock_shifts' })
    .leftJoin({ creator: 'users' }, 'creator.id', 's.created_by')
    .leftJoin({ reverser: 'users' }, 'reverser.id', 's.reversed_by')
    .select(COLUMNS);
}

/** Shifts of a station, reversed ones too, latest first. */
export async function listClockShifts(
  stationId: number,
  conn: Connection = pool(),
): Promise<ClockShiftRow[]> {
  return selectShifts(conn).where({ 's.station_id': stationId }).orderBy('s.id', 'desc');
}

export async function findClockShift(
  stationId: number,
  id: number,
  conn: Connection = pool(),
): Promise<ClockShiftRow | undefined> {
  return selectShifts(conn).where({ 's.station_id': stationId, 's.id': id }).first();
}

/** The oldest shift that the worker has something to do for. */
export async function findWorkingShift(
  exceptIds: readonly number[] = [],
  conn: Connection = pool(),
): Promise<ClockShiftRow | undefined> {
  return selectShifts(conn)
    .whereIn('s.state', ['moving', 'reversing'])
    .whereNotIn('s.id', [...exceptIds])
    .orderBy('s.id')
    .first();
}

/** A shift that stands, as receiving asks for it. */
export interface StandingShift extends ClockEpisode {
  id: number;
  state: Exclude<ClockShiftState, 'reversed'>;
}

const STANDING = ['moving', 'moved', 'reversing'] as const;

/** The condition, as SQL, that a shift stands of a station, or is being made or reversed. */
export function isShiftedText(stationId: string): string {
  const states = STANDING.map((state) => `'${state}'`).join(', ');
  return `EXISTS (SELECT 1 FROM clock_shifts WHERE clock_shifts.station_id = ${stationId} AND clock_shifts.state IN (${states}))`;
}

/** Shifts of a station that stand, or are being made or reversed, by their beginning. */
export async function selectStandingShifts(
  stationId: number,
  conn: Connection = pool(),
): Promise<StandingShift[]> {
  return conn('clock_shifts')
    .where({ station_id: stationId })
    .whereIn('state', STANDING)
    .orderBy('from_sec')
    .select({
      id: 'id',
      fromSec: 'from_sec',
      toSec: 'to_sec',
      shiftSec: 'shift_sec',
      receivedFromSec: 'received_from_sec',
      state: 'state',
    });
}

export interface NewClockShift extends ClockEpisode {
  networkId: number;
  stationId: number;
  reason: string;
  plannedCount: number;
  userId: string;
}

export async function insertClockShift(shift: NewClockShift, conn: Connection): Promise<number> {
  const [id] = await conn('clock_shifts').insert({
    network_id: shift.networkId,
    station_id: shift.stationId,
    from_sec: shift.fromSec,
    to_sec: shift.toSec,
    shift_sec: shift.shiftSec,
    received_from_sec: shift.receivedFromSec,
    reason: shift.reason,
    state: 'moving',
    planned_count: shift.plannedCount,
    created_by: shift.userId,
    created_at: new Date(),
  });
  return id ?? 0;
}

/** State and counts of a shift, with its row locked. */
export async function lockClockShift(
  id: number,
  transaction: Connection,
): Promise<Pick<ClockShiftRow, 'state' | 'fromSec' | 'shiftSec' | 'movedCount' | 'asideCount'>> {
  return transaction('clock_shifts').where({ id }).forUpdate().first({
    state: 'state',
    fromSec: 'from_sec',
    shiftSec: 'shift_sec',
    movedCount: 'moved_count',
    asideCount: 'aside_count',
  });
}

interface ClockShiftChange {
  state?: ClockShiftState;
  movedCount?: number;
  asideCount?: number;
  problem?: string;
  finishedAt?: Date | null;
  reversedBy?: string;
  reversalReason?: string;
}

export async function updateClockShift(
  id: number,
  change: ClockShiftChange,
  transaction: Connection,
): Promise<void> {
  const columns = {
    state: change.state,
    moved_count: change.movedCount,
    aside_count: change.asideCount,
    problem: change.problem,
    finished_at: change.finishedAt,
    reversed_by: change.reversedBy,
    reversal_reason: change.reversalReason,
  };
  const given = Object.entries(columns).filter(([, value]) => value !== undefined);
  await transaction('clock_shifts').where({ id }).update(Object.fromEntries(given));
}
