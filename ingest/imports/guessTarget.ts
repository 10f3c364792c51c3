import { bandByNominalHz, parseBandLabel } from '#lib/acoustics/bands';
import { IMPORT_FIELDS, type ImportField } from '#lib/contracts/imports';

/** Headings that mean a field, without case, units and punctuation. */
const ALIASES: Partial<Record<ImportField, readonly string[]>> = {
  start: [
    'starttime',
    'begin',
    'from',
    'timestamp',
    'datetime',
    'dateandtime',
    'periodstart',
    'intervalstart',
  ],
  date: ['day', 'startdate', 'datum'],
  time: ['clock', 'uhrzeit'],
  seconds: ['second', 'duration', 'length', 'elapsed', 'elapsedtime', 'measurementtime'],
  LAeq: ['leqa', 'laeqt'],
  LAFmax: ['lamax', 'lafmx', 'lmaxaf'],
  LAFmin: ['lamin', 'lafmn', 'lminaf'],
  LCeq: ['leqc'],
  LCpeak: ['lcpk', 'lpeakc', 'lpkc'],
  flags: ['flag', 'markers', 'status'],
  windSpeed: ['wind', 'windvelocity', 'ws'],
  windDirection: ['winddir', 'wd'],
  temperature: ['temp', 'airtemperature'],
  battery: ['batteryvoltage', 'voltage', 'supply'],
};
/** A band's heading: `63`, `63 Hz`, `1 kHz`, `LZeq 63 Hz`, `Leq_31,5`. Not `LAeq 63 Hz`: band levels are unweighted. */
const BAND = /^(?:l(?:z|l|p)?(?:f|eq)?[\s_-]*)?(\d+(?:[.,]\d+)?)\s*(k?)\s*(?:hz)?$/i;

/** What a column probably is by its heading; null where nothing speaks for anything. */
export function guessTarget(heading: string): string | null {
  // `Leq(A)` names its weighting, other brackets a unit.
  const bare = heading
    .replace(/\(([ac])\)/i, '$1')
    .replace(/\[[^\]]*\]|\([^)]*\)/g, '')
    .trim();
  const band = BAND.exec(bare);
  if (band) {
    const hz = parseBandLabel(`${(band[1] ?? '').replace(',', '.')}${band[2] ?? ''}`);
    return hz !== undefined && bandByNominalHz(3, hz) ? String(hz) : null;
  }
  const key = bare.toLowerCase().replace(/[^a-z]/g, '');
  const field = IMPORT_FIELDS.find((name) => name.toLowerCase() === key || ALIASES[name]?.includes(key));
  return field ?? null;
}

/** The same for all columns of a file: each target once, and a time without a date is the start. */
export function guessTargets(headings: readonly string[]): (string | null)[] {
  const seen = new Set<string>();
  const targets = headings.map((heading) => {
    const target = guessTarget(heading);
    if (target === null || seen.has(target)) return null;
    seen.add(target);
    return target;
  });
  if (seen.has('start')) return targets.map((one) => (one === 'date' || one === 'time' ? null : one));
  if (seen.has('date') && seen.has('time')) return targets;
  return targets.map((one) => (one === 'date' || one === 'time' ? 'start' : one));
}
