import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import type { callApi } from './callApi';
import { makePerson } from './people';

/** Everybody who may knock, in the order in which tables name them. */
export const CALLERS = [
  'nobody',
  'a station',
  'regulator',
  'liaison',
  'operator',
  'administrator',
  'operator of another network',
] as const;

export type CallerName = (typeof CALLERS)[number];
export type Credentials = Pick<NonNullable<Parameters<typeof callApi>[2]>, 'session' | 'token'>;

/** What each caller sends along, made anew: some acts end a session. */
export async function makeCaller(
  name: CallerName,
  { home, foreign, stationId }: { home: number; foreign: number; stationId: number },
): Promise<Credentials> {
  switch (name) {
    case 'nobody':
      return {};
    case 'a station':
      return {
        token: await inTransaction((transaction) => insertStationToken(stationId, null, transaction)),
      };
    case 'administrator':
      return { session: (await makePerson(null, [], true)).session };
    case 'operator of another network':
      return { session: (await makePerson(foreign, ['operator'])).session };
    default:
      return { session: (await makePerson(home, [name])).session };
  }
}
