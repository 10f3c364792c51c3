import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { type StationRow } from '#db/queries/stations';
import {
  insertStationToken,
  labelStationToken,
  listStationTokens,
  revokeStationToken,
} from '#db/queries/stationTokens';
import { type StationToken } from '#lib/contracts/stationTokens';

/** Tokens of a station, newest first, ended ones too; the secrets themselves are kept nowhere. */
export async function stationTokens(station: StationRow): Promise<StationToken[]> {
  const tokens = await listStationTokens(station.id);
  return tokens.map(({ id, label, createdAt, lastUsedAt, revokedAt }) => ({
    id,
    label,
    createdAt: createdAt.toISOString(),
    lastUsedAt: lastUsedAt?.toISOString() ?? null,
    revokedAt: revokedAt?.toISOString() ?? null,
  }));
}

/** Makes a further token, told this once; those before it stay in force until they are revoked. */
export function addStationToken(
  station: StationRow,
  userId: string,
  label = '',
): Promise<{ id: number; token: string }> {
  return inTransaction(async (transaction) => {
    const token = await insertStationToken(station.id, userId, transaction);
    const [newest] = await listStationTokens(station.id, transaction);
    const id = newest?.id ?? 0;
    if (label !== '') await labelStationToken(station.id, id, label, transaction);
    await audit(station, userId, 'station-token.make', id, transaction);
    return { id, token };
  });
}

/** Ends a token at once; answers whether there was one to end. */
export function endStationToken(station: StationRow, id: number, userId: string): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const isEnded = await revokeStationToken(station.id, id, transaction);
    if (isEnded) await audit(station, userId, 'station-token.revoke', id, transaction);
    return isEnded;
  });
}

function audit(
  station: StationRow,
  userId: string,
  action: string,
  tokenId: number,
  transaction: Parameters<typeof appendAudit>[1],
): Promise<void> {
  const subject = `station ${station.code}`;
  return appendAudit(
    { userId, networkId: station.networkId, action, subject, detail: { tokenId } },
    transaction,
  );
}
