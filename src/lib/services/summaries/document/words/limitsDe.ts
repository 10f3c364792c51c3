/** Windows that are parts of a date, in the genitive. */
const PARTS: Readonly<Record<string, string>> = {
  'the day': 'des Tages',
  'the evening': 'des Abends',
  'the night': 'der Nacht',
  'the date': 'des Datums',
};
const BANDS: Readonly<Record<string, string>> = {
  third: 'der Terz',
  thirds: 'der Terzen',
  octave: 'der Oktave',
  octaves: 'der Oktaven',
};

const ofWindow = (window: string) => PARTS[window] ?? `von ${window}`;
const withinWindow = (window: string) => `innerhalb ${ofWindow(window)}`;

/** Rules by the wording of `limitMetricText`, each for the whole of what stands before or after what is left of it. */
const RULES: readonly (readonly [RegExp, (...found: string[]) => string])[] = [
  [/, rolling by (\d+ min)$/, (_, step = '') => `, gleitend um ${step}`],
  [/^number of events above /, () => 'Zahl der Ereignisse über '],
  [/^LAE of one event above /, () => 'LAE eines Ereignisses über '],
  [/^tonal share of (.+), in per cent/, (_, window = '') => `tonaler Anteil ${ofWindow(window)}, in Prozent`],
  [/ (?:within|over) ([^,]+)/, (_, window = '') => ` ${withinWindow(window)}`],
  [/ of the date$/, () => ' des Datums'],
  [/ above the usual/, () => ' über dem Üblichen'],
  [/ of the last /, () => ' der letzten Zeit von '],
  [
    / of the (.+?)(?: to (.+))? (thirds?|octaves?)(?=,|$)/,
    (_, from = '', to = '', kind = '') => ` ${BANDS[kind] ?? kind} ${from}${to === '' ? '' : ` bis ${to}`}`,
  ],
  [/(\d)\.(\d)/g, (_, whole = '', tenths = '') => `${whole},${tenths}`],
];

/** What a limit compares, as `limitMetricText` names it, in German. */
export function germanLimitText(text: string): string {
  return RULES.reduce(
    (done, [found, by]) => done.replace(found, (...match: string[]) => by(...match.slice(0, 4))),
    text,
  );
}
