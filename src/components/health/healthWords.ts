import type { Thresholds, TroubleKind } from '#lib/contracts/health';

/** Seconds of an instant as the interface gives it. */
export const secOf = (instant: string) => Math.floor(Date.parse(instant) / 1000);

/** A trouble in one or two words, for a table's cell. */
export const KIND_WORDS: Record<TroubleKind, string> = {
  silent: 'silent',
  clock: 'clock off',
  frozen: 'levels frozen',
  bands: 'bands against LAeq',
  floor: 'quiet shifted',
  flags: 'unexpected flags',
  battery: 'battery low',
  late: 'data late',
  coverage: 'coverage low',
  wind: 'wind stuck',
  drift: 'drifting',
  selfcheck: 'self-check off',
};

interface ThresholdField {
  name: keyof Thresholds;
  label: string;
  hint: string;
  unit: string;
}

/** Fields of the form of bounds, in the order in which they are asked. */
export const THRESHOLD_FIELDS: readonly ThresholdField[] = [
  {
    name: 'silentAfterMinutes',
    label: 'Silent after',
    hint: 'Without a post; never less than three intervals',
    unit: 'min',
  },
  {
    name: 'lateAfterMinutes',
    label: 'Late after',
    hint: 'Posts come, but the newest data are older; never less than three intervals',
    unit: 'min',
  },
  { name: 'leastCoverage', label: 'Least coverage', hint: 'Received of the last 24 hours', unit: '%' },
  { name: 'leastBattery', label: 'Lowest battery', hint: 'Median of an hour', unit: 'V' },
  { name: 'mostClockOffSeconds', label: 'Clock off by', hint: 'At two posts in a row', unit: 's' },
  {
    name: 'frozenForMinutes',
    label: 'Levels frozen for',
    hint: 'The very same levels, band by band',
    unit: 'min',
  },
  {
    name: 'floorShift',
    label: 'Quiet shifted by',
    hint: 'The quiet of the last day against the usual of a fortnight',
    unit: 'dB',
  },
  {
    name: 'windStuckForHours',
    label: 'Wind stuck for',
    hint: 'The very same wind speed; a calm has to last four times as long',
    unit: 'h',
  },
  {
    name: 'driftShift',
    label: 'Drift of',
    hint: 'The nightly background against the neighbours’, in ten days against eight weeks before',
    unit: 'dB',
  },
  {
    name: 'selfCheckShift',
    label: 'Self-checks moved by',
    hint: 'In ten days against eight weeks before',
    unit: 'dB',
  },
];

/** Field → its label, for the summary of errors. */
export const HEALTH_LABELS: Readonly<Record<string, string>> = {
  ...Object.fromEntries(THRESHOLD_FIELDS.map(({ name, label }) => [name, label])),
  recipients: 'Who is told',
  station: 'Station',
};

/** What the form shows of bounds, by field: a share in per cent, nothing where none is set. */
export function thresholdText(thresholds: Thresholds): Record<string, string> {
  return Object.fromEntries(
    Object.entries(thresholds).map(([name, value]) => [
      name,
      name === 'leastCoverage' ? String(Math.round(value * 1000) / 10) : String(value),
    ]),
  );
}
