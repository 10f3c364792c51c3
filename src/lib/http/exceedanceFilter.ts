import { findStation } from '#db/queries/stations';
import { EXCEEDANCE_STATES } from '#lib/contracts/exceedances';
import type { ExceedanceFilter } from '#lib/services/exceedances/list';
import { parseCount, parseOptionalPeriod } from './parse';
import { badRequest, notFound } from './problem';

const LARGEST_ID = 999_999_999;

/** Which exceedances a query asks for. @throws {Problem} 400 with what is wrong, 404 for a station that is not the network's. */
export async function parseExceedanceFilter(url: URL, networkId: number): Promise<ExceedanceFilter> {
  const query = url.searchParams;
  const hasPeriod = query.has('from') || query.has('to');
  const code = query.get('station');
  const station = code === null ? null : await findStation(networkId, code);
  if (station === undefined) throw notFound('The network has no station with this code.');
  return {
    ...(hasPeriod && parseOptionalPeriod(url)),
    ...(station && { stationId: station.id }),
    ...(query.has('limitId') && { limitId: parseCount(url, 'limitId', { fallback: 1, most: LARGEST_ID }) }),
    state: choice(url, 'state', EXCEEDANCE_STATES),
    isAcknowledged: truth(choice(url, 'acknowledged', ['yes', 'no'])),
  };
}

/** The number of an exceedance in an address; 0, which none has, for anything else. */
export function exceedanceId(text: string | undefined): number {
  return /^\d{1,9}$/.test(text ?? '') ? Number(text) : 0;
}

function choice<T extends string>(url: URL, name: string, choices: readonly T[]): T | undefined {
  const text = url.searchParams.get(name);
  const found = choices.find((candidate) => candidate === text);
  if (text !== null && !found) throw badRequest(`\`${name}\` must be one of ${choices.join(', ')}.`);
  return found;
}

function truth(word: 'yes' | 'no' | undefined): boolean | undefined {
  return word === undefined ? undefined : word === 'yes';
}
