import { type QuarantineFilter } from '#db/queries/quarantine';
import { findStation } from '#db/queries/stations';
import { QUARANTINE_CODES, QUARANTINE_STATES, type QuarantineFilterAsked } from '#lib/contracts/quarantine';
import { type Choice } from '#lib/services/quarantine/choice';
import { parseChoice, parseOptionalPeriod } from './parse';
import { badRequest, invalidFields, notFound } from './problem';

const LATEST_SEC = 4_294_967_295;

/** The filter in a list's address. @throws {Problem} 400, 404 with what is wrong. */
export async function quarantineFilterOf(url: URL, networkId: number): Promise<QuarantineFilter> {
  const { searchParams } = url;
  const station = searchParams.get('station');
  const found = station === null ? null : await findStation(networkId, station);
  if (found === undefined) throw notFound('The network has no station with this code.');
  const code = searchParams.get('code');
  if (code !== null && !QUARANTINE_CODES.some((known) => known === code)) {
    throw badRequest(`\`code\` must be one of ${QUARANTINE_CODES.join(', ')}.`);
  }
  const state = parseChoice(url, 'state', [...QUARANTINE_STATES, 'all']);
  return {
    networkId,
    stationId: found?.id ?? null,
    code,
    state: state === 'all' ? null : state,
    period: searchParams.has('from') || searchParams.has('to') ? parseOptionalPeriod(url) : null,
  };
}

/** The records that a body chooses, of those in one state. @throws {Problem} 422 for a station that is not there. */
export async function quarantineChoiceOf(
  { ids, filter }: { ids?: number[] | undefined; filter?: QuarantineFilterAsked | undefined },
  networkId: number,
  state: 'open' | 'dismissed',
): Promise<Choice> {
  if (!filter) return { networkId, ids: ids ?? [] };
  const { station, code, from, to } = filter;
  const found = station === undefined ? null : await findStation(networkId, station);
  if (found === undefined) {
    throw invalidFields([{ field: 'filter.station', message: 'is not a station of this network' }]);
  }
  const isAnyTime = from === undefined && to === undefined;
  return {
    filter: {
      networkId,
      stationId: found?.id ?? null,
      code: code ?? null,
      state,
      period: isAnyTime ? null : { fromSec: from ?? 0, toSec: to ?? LATEST_SEC },
    },
  };
}
