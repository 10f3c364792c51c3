import { listComplaintReferences } from '#db/queries/complaintReferences';
import { listLimitRecords } from '#db/queries/limits';
import { listStations } from '#db/queries/stations';
import { listStationMonths } from '#db/queries/summaries';
import { type Role } from '#db/queries/users';
import { type Hit, type HitKind } from '#lib/contracts/search';
import { limitMetricText, limitUnit, limitValueText } from '#lib/format/limitMetric';
import { formatMonth } from '#lib/format/times';
import { matchScore, wordsOf } from './match';
import { FINDABLE_PAGES } from './pages';

/** Who looks, and where. */
export interface Seeker {
  network: { id: number; slug: string };
  isAdministrator: boolean;
  /** Whether the person may do what one of these roles may. */
  mayAct: (roles: readonly Role[]) => boolean;
}

/** Room for all pages, so that without words there are stations beside them. */
const MOST_HITS = 60;
const MOST_OF_A_KIND = 8;

interface Candidate extends Hit {
  score: number;
}

/** What of a network a person may open, by words: pages, stations, limits, complaints by reference, months; best first. */
export async function findInNetwork(seeker: Seeker, text: string): Promise<Hit[]> {
  const words = wordsOf(text);
  const base = `/n/${seeker.network.slug}`;
  const networkId = seeker.network.id;
  const found = [
    pages(seeker, base, words),
    ...(await Promise.all([
      stations(networkId, base, words),
      words.length > 0 ? limits(networkId, base, words) : [],
      words.some(isOfReference) ? complaints(networkId, base, words) : [],
      words.some(isOfMonth) ? months(networkId, base, words) : [],
    ])),
  ];
  return found
    .flatMap(best)
    .sort((a, b) => b.score - a.score)
    .slice(0, MOST_HITS)
    .map(({ kind, label, detail, href }) => ({ kind, label, detail, href }));
}

function best(candidates: Candidate[]): Candidate[] {
  const matching = candidates.filter(({ score }) => score > 0).sort((a, b) => b.score - a.score);
  return matching[0]?.kind === 'page' ? matching : matching.slice(0, MOST_OF_A_KIND);
}

function candidate(kind: HitKind, hit: Omit<Hit, 'kind'>, words: readonly string[], terms = ''): Candidate {
  return { kind, ...hit, score: matchScore(words, hit.label, `${hit.detail} ${terms}`) };
}

function pages({ isAdministrator, mayAct }: Seeker, base: string, words: readonly string[]): Candidate[] {
  return FINDABLE_PAGES.filter(
    ({ roles, isForAdministrators }) =>
      (!roles || mayAct(roles)) && (isForAdministrators !== true || isAdministrator),
  ).map(({ label, terms, path }) =>
    candidate(
      'page',
      { label, detail: '', href: path.startsWith('/') ? path : `${base}/${path}` },
      words,
      terms,
    ),
  );
}

async function stations(networkId: number, base: string, words: readonly string[]): Promise<Candidate[]> {
  return (await listStations(networkId)).map(({ code, name, retiredAt }) =>
    candidate(
      'station',
      {
        label: name,
        detail: retiredAt ? `${code}, retired` : code,
        href: `${base}/stations/${encodeURIComponent(code)}`,
      },
      words,
    ),
  );
}

async function limits(networkId: number, base: string, words: readonly string[]): Promise<Candidate[]> {
  const newest = new Map((await listLimitRecords(networkId)).map((record) => [record.limitId, record]));
  return [...newest.values()].map((record) => {
    const what = `${limitMetricText(record)} above ${limitValueText(record.thresholdTenths / 10, limitUnit(record.metric))}`;
    const detail = record.withdrawnAt ? `${what}, withdrawn` : what;
    return candidate(
      'limit',
      { label: record.name, detail, href: `${base}/limits/${record.limitId}` },
      words,
    );
  });
}

/** By reference only: who complained and of what is nobody's to search for. */
async function complaints(networkId: number, base: string, words: readonly string[]): Promise<Candidate[]> {
  const found = await listComplaintReferences(networkId, words, MOST_OF_A_KIND);
  return found.map(({ reference, status }) => ({
    kind: 'complaint',
    label: reference,
    detail: status,
    href: `${base}/complaints/${encodeURIComponent(reference)}`,
    score: 1 + 4 * words.length,
  }));
}

async function months(networkId: number, base: string, words: readonly string[]): Promise<Candidate[]> {
  const listed = new Set((await listStationMonths(networkId)).map(({ month }) => month));
  return [...listed].map((month) =>
    candidate(
      'month',
      { label: formatMonth(month), detail: 'monthly summary', href: `${base}/summaries/${month}` },
      words,
      month,
    ),
  );
}

const MONTHS = Array.from({ length: 12 }, (_, n) =>
  formatMonth(`2026-${String(n + 1).padStart(2, '0')}`).toLowerCase(),
);

/** Months cost a look at every day: only words that may mean one have it done. */
function isOfMonth(word: string): boolean {
  return /^\d/.test(word) || (word.length >= 3 && MONTHS.some((month) => month.startsWith(word)));
}

function isOfReference(word: string): boolean {
  return /\d/.test(word) || word.length >= 3;
}
