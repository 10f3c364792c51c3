/** Parts of a station or network in the month's document, as its reader knows them. */
const PARTS: Record<string, string> = {
  figures: 'the month',
  yearToDate: 'year to date',
  days: '',
  hours: '',
  bands: 'band',
  octaves: 'octave',
  tonality: 'tones',
  lowFrequency: 'low frequencies',
  exclusions: 'exclusion',
  exceedances: 'exceedances',
  compliance: 'compliance',
  calibrations: 'calibration',
  instruments: 'instrument',
  deployments: 'instrument',
  weather: 'weather',
  wind: 'wind',
  limits: 'limit',
  placements: 'microphone',
  conventions: 'conventions',
};

/** Names of figures that are not the trade's own. */
const FIGURES: Record<string, string> = {
  coverage: 'coverage (share)',
  meetsMinimum: 'enough data',
  sampleSeconds: 'length of a sample, s',
  coverageSinceRegistration: 'coverage since registration (share)',
  items: 'entry',
  monthImage: 'picture of the month',
};

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/**
 * A changed figure's path in the month's document in plain words: "days 2026-03-12 Lday" is "12 Mar 2026: Lday". What has no words
 * of its own is told by its parts, camel case taken apart.
 */
export function figureName(path: string): string {
  const [part = '', ...rest] = path.split(' ');
  const place = PARTS[part] ?? plain(part);
  const words = rest.map((word) => dateWords(word) ?? FIGURES[word] ?? plain(word));
  const isWhen = dateWords(rest[0] ?? '') !== null;
  if (!isWhen) return [...(words.length > 0 ? [words.join(' ')] : []), place].filter(Boolean).join(', ');
  const hasHour = /^\d{1,2}:00$/.test(rest[1] ?? '');
  const when = words.slice(0, hasHour ? 2 : 1).join(' ');
  return `${[place, when].filter(Boolean).join(' ')}: ${words.slice(hasHour ? 2 : 1).join(' ')}`;
}

function dateWords(word: string): string | null {
  const [, year, month, day] = /^(\d{4})-(\d{2})-(\d{2})$/.exec(word) ?? [];
  return day === undefined ? null : `${Number(day)} ${MONTHS[Number(month) - 1]} ${year}`;
}

/** "driftKnown" as "drift known"; names of levels (LAeq, Lden) stay. */
function plain(word: string): string {
  return /^[a-z]+([A-Z][a-z]+)+$/.test(word)
    ? word.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`)
    : word;
}
