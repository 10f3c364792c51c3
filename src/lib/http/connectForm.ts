import { type StationRow } from '#db/queries/stations';
import { newStationTokenSchema } from '#lib/contracts/stationTokens';
import { addStationToken, endStationToken } from '#lib/services/stations/tokens';
import { type FormValues } from './forms';
import { badRequest, notFound } from './problem';

/**
 * Does what a form of the connect page asks: makes a token and answers it, this once, or ends one and answers null.
 * @throws {Problem} and zod errors with what is wrong.
 */
export async function tokenOfForm(
  { text }: FormValues,
  station: StationRow,
  userId: string,
): Promise<string | null> {
  switch (text['act']) {
    case 'issue': {
      const { label } = newStationTokenSchema.parse({ label: text['label'] ?? '' });
      return (await addStationToken(station, userId, label)).token;
    }
    case 'revoke': {
      const id = Number(/^\d{1,10}$/.exec(text['token'] ?? '')?.[0] ?? 0);
      if (await endStationToken(station, id, userId)) return null;
      throw notFound('The station has no such token in force; perhaps it was revoked meanwhile.');
    }
    default:
      throw badRequest('The form did not say what to do. Nothing was changed.');
  }
}
