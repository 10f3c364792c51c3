import { createHash, randomBytes } from 'node:crypto';
import type { BandFraction } from '#lib/acoustics/bands';
import { pool, type Connection } from './connection';

export interface StationTokenRow {
  id: number;
  /** What people call it; empty when they did not say. */
  label: string;
  createdAt: Date;
  revokedAt: Date | null;
  lastUsedAt: Date | null;
}

/** Makes a token and answers it in the clear, the only time that it can be seen. Others of the station stay in force. */
export async function insertStationToken(
  stationId: number,
  createdBy: string | null,
  conn: Connection,
): Promise<string> {
  const secret = `bs_${randomBytes(32).toString('base64url')}`;
  await conn('station_tokens').insert({
    station_id: stationId,
    digest: digestOf(secret),
    created_by: createdBy,
    created_at: new Date(),
  });
  return secret;
}

/** What receiving must know of the station whose token it was given. */
export interface TokenStation {
  tokenId: number;
  lastUsedAt: Date | null;
  id: number;
  bandFraction: BandFraction;
  /** Epoch seconds; older intervals are refused; null: no bound. */
  acceptsFromSec: number | null;
}

/** The station that a token in force belongs to; none for a retired one. */
export async function findStationByToken(
  secret: string,
  conn: Connection = pool(),
): Promise<TokenStation | undefined> {
  const [rows] = await conn.raw(
    `SELECT station_tokens.id AS tokenId, station_tokens.last_used_at AS lastUsedAt, stations.id AS id,
       stations.band_fraction AS bandFraction, stations.accepts_from AS acceptsFromSec
     FROM station_tokens JOIN stations ON stations.id = station_tokens.station_id
     WHERE station_tokens.digest = ? AND station_tokens.revoked_at IS NULL AND stations.retired_at IS NULL`,
    [digestOf(secret)],
  );
  return (rows as TokenStation[])[0];
}

export async function listStationTokens(
  stationId: number,
  conn: Connection = pool(),
): Promise<StationTokenRow[]> {
  return conn('station_tokens').where({ station_id: stationId }).orderBy('id', 'desc').select({
    id: 'id',
    label: 'label',
    createdAt: 'created_at',
    revokedAt: 'revoked_at',
    lastUsedAt: 'last_used_at',
  });
}

/** Gives a token of the station the name that people tell it by. */
export async function labelStationToken(
  stationId: number,
  id: number,
  label: string,
  conn: Connection,
): Promise<void> {
  await conn('station_tokens').where({ id, station_id: stationId }).update({ label });
}

/** Notes that a token was used; only when the last note is more than a minute old. */
export async function noteTokenUse(tokenId: number, now: Date, conn: Connection = pool()): Promise<void> {
  await conn('station_tokens')
    .where({ id: tokenId })
    .where((query) =>
      query.whereNull('last_used_at').orWhere('last_used_at', '<', new Date(now.getTime() - 60_000)),
    )
    .update({ last_used_at: now });
}

/** Ends a token of the station at once; answers whether there was one to end. */
export async function revokeStationToken(stationId: number, id: number, conn: Connection): Promise<boolean> {
  const changed = await conn('station_tokens')
    .where({ id, station_id: stationId, revoked_at: null })
    .update({ revoked_at: new Date() });
  return changed > 0;
}

function digestOf(secret: string): Buffer {
  return createHash('sha256').update(secret).digest();
}
