import { settingsAt } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import {
  MOST_ASKED_DAYS,
  spectrumSearchOptionsSchema,
  type SpectrumSearchAnswer,
  type SpectrumSpell,
} from '#lib/contracts/spectrumSearch';
import { addDays, localDateAt, startOfDaySec } from '#lib/time/zone';
import type { Span } from '../levels/spans';
import { searchSpectrum } from '../spectra/search';
import { JobCancelled, JobsFull } from '../threads/messages';

/** Where the same spectrum was heard on other dates, for the evidence of a complaint. */
export interface SameSpectrum {
  /** `partly`: the time for it was over before every date had been looked at. */
  state: 'searched' | 'partly' | 'not-searched';
  /** Why it was not searched, or not all of it, as a sentence; null: it was. */
  why: string | null;
  /** Dates that were searched, without those of the period itself. */
  searched: Span;
  /** Largest RMS difference of two shapes that counts as the same, dB. */
  likenessDb: number;
  /** Most alike first, of every station with thirds; times as instants. */
  spells: SpectrumSpell[];
  /** How many spells were found in all. */
  found: number;
  /** When and where most of it was, in words; empty with too little to tell. */
  pattern: string;
}

/** How long evidence may wait for it. */
const MOST_MS = 3000;
/** Beyond that, for other searches to end and the answer to be made. */
const MOST_WAIT_MS = 4000;
const SEARCHED_DAYS = 365;
const MOST_SPELLS = 5;

/**
 * The best spells of a period's mean spectrum on other dates of the year up to now, at any station. Bounded in time: what could not be
 * searched is said, nothing is thrown for it.
 */
export async function sameSpectrum(
  { station, period, nowSec }: { station: StationRow; period: Span; nowSec: number },
  { mostMs = MOST_MS, mostSpells = MOST_SPELLS }: { mostMs?: number; mostSpells?: number } = {},
): Promise<SameSpectrum> {
  const { timeZone } = await settingsAt(station.networkId, period.fromSec);
  const leftOut = datesOf(period, timeZone);
  const since = startOfDaySec(addDays(localDateAt(nowSec, timeZone), -SEARCHED_DAYS), timeZone);
  const searched = { fromSec: since, toSec: nowSec };
  const options = spectrumSearchOptionsSchema.parse({});
  const none = { searched, likenessDb: options.likeness, spells: [], found: 0, pattern: '' };
  const notSearched = (why: string): SameSpectrum => ({ ...none, state: 'not-searched', why });
  if (period.toSec - period.fromSec > MOST_ASKED_DAYS * 86_400)
    return notSearched(`The period is longer than ${MOST_ASKED_DAYS} days, which has no one spectrum.`);
  try {
    const signal = AbortSignal.timeout(mostMs + MOST_WAIT_MS);
    const search = { station, period, searched, codes: [], options, nowSec, leftOut, mostMs };
    const answer = await searchSpectrum(search, { signal });
    const why = whyNot(answer);
    if (why !== null) return notSearched(why);
    return {
      ...none,
      ...partWords(answer),
      spells: answer.spells.slice(0, mostSpells),
      found: answer.spellsFound,
      pattern: answer.pattern.words,
    };
  } catch (error) {
    if (error instanceof JobCancelled) return notSearched('It would have taken too long just now.');
    if (error instanceof JobsFull) return notSearched('Other searches were waiting.');
    throw error;
  }
}

/** The local dates that a period touches, from midnight to midnight. */
function datesOf({ fromSec, toSec }: Span, zone: string): Span {
  const last = localDateAt(toSec - 1, zone);
  return {
    fromSec: startOfDaySec(localDateAt(fromSec, zone), zone),
    toSec: startOfDaySec(addDays(last, 1), zone),
  };
}

function whyNot({ state }: SpectrumSearchAnswer): string | null {
  switch (state) {
    case 'octave-bands':
      return 'The station sends octaves, whose spectra cannot be looked for.';
    case 'no-data':
      return 'The period has no valid data.';
    case 'too-few-bands':
      return 'The period has too few bands.';
    case 'searched':
      return null;
  }
}

function partWords({ isComplete, stations }: SpectrumSearchAnswer): Pick<SameSpectrum, 'state' | 'why'> {
  if (!isComplete)
    return { state: 'partly', why: 'The time for it was over before every date had been looked at.' };
  const leftOut = stations.reduce((sum, { daysLeftOut }) => sum + daysLeftOut, 0);
  if (leftOut === 0) return { state: 'searched', why: null };
  const days = leftOut === 1 ? 'One day of a station waits' : `${leftOut} days of stations wait`;
  return { state: 'partly', why: `${days} for recomputation and could not be looked at.` };
}
