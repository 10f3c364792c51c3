import { findStation } from '#db/queries/stations';
import {
  MOST_ASKED_DAYS,
  MOST_SEARCHED_DAYS,
  spectrumSearchOptionsSchema,
} from '#lib/contracts/spectrumSearch';
import { type SpectrumSearch } from '#lib/services/spectra/search';
import { instantParameter, parsePeriod, type Period } from './parse';
import { badRequest, notFound } from './problem';

const DAY_SEC = 86_400;
const YEAR_SEC = 365 * DAY_SEC;

/** What a query of the interface looks for. @throws {Problem} 400, 404; zod's errors become 422 */
export async function parseSpectrumSearch(
  url: URL,
  networkId: number,
  nowSec: number,
): Promise<SpectrumSearch> {
  const period = parsePeriod(url);
  if (period.toSec - period.fromSec > MOST_ASKED_DAYS * DAY_SEC) {
    throw badRequest(`The period of the spectrum may be ${MOST_ASKED_DAYS} days at most.`);
  }
  const station = await findStation(networkId, url.searchParams.get('station') ?? '');
  if (!station) throw notFound('The network has no station with this code.');
  const codes = await knownCodes(url.searchParams.get('stations') ?? '', networkId);
  const searched = searchedOf(url, nowSec);
  const options = spectrumSearchOptionsSchema.parse(Object.fromEntries(url.searchParams));
  return { station, period, searched, codes, options, nowSec };
}

function searchedOf(url: URL, nowSec: number): Period {
  const toSec = url.searchParams.has('until') ? instantParameter(url, 'until') : nowSec;
  const fromSec = url.searchParams.has('since') ? instantParameter(url, 'since') : toSec - YEAR_SEC;
  if (fromSec >= toSec) throw badRequest('`since` must be before `until`.');
  if (toSec - fromSec > MOST_SEARCHED_DAYS * DAY_SEC) {
    throw badRequest('The dates that are searched span too many years.');
  }
  return { fromSec: Math.max(0, fromSec), toSec };
}

/** Codes that the network has, each once. */
async function knownCodes(text: string, networkId: number): Promise<string[]> {
  const codes = [...new Set(text.split(',').map((code) => code.trim()))].filter((code) => code !== '');
  if (codes.length > 200) throw badRequest('`stations` may name 200 at most.');
  for (const code of codes) {
    if (!(await findStation(networkId, code)))
      throw notFound('The network has no station with one of these codes.');
  }
  return codes;
}
