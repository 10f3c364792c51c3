import { type Import, type ImportField, type RowReason } from '#lib/contracts/imports';

/** The state of an import for people. */
export const STATE_WORDS: Record<Import['state'], string> = {
  mapping: 'Waits to be told its columns',
  checking: 'Being checked',
  checked: 'Checked, not stored',
  storing: 'Being stored',
  stored: 'Stored',
  undoing: 'Being undone',
  undone: 'Undone',
  redoing: 'Being redone',
  discarding: 'Being discarded',
  discarded: 'Discarded',
  failed: 'Cannot be read',
};

/** States that the worker ends by itself. */
export function isUnderWay(state: Import['state']): boolean {
  return ['checking', 'storing', 'undoing', 'redoing', 'discarding'].includes(state);
}

export const REASON_WORDS: Record<RowReason, string> = {
  malformed: 'Malformed',
  'out-of-range': 'Value out of range',
  'clock-ahead': 'In the future',
  'too-old': 'Too old for the station',
  overlap: 'Overlaps another interval',
  conflict: 'Differs from the stored interval of the same start',
  'unknown-band': 'Unknown band',
  'ambiguous-time': 'Local time that came twice',
  'nonexistent-time': 'Local time that never was',
};

export const FIELD_WORDS: Record<ImportField, string> = {
  start: 'Start (date and time)',
  date: 'Date of the start',
  time: 'Time of the start',
  seconds: 'Length, s or hh:mm:ss',
  LAeq: 'LAeq, dB',
  LAFmax: 'LAFmax, dB',
  LAFmin: 'LAFmin, dB',
  LCeq: 'LCeq, dB',
  LCpeak: 'LCpeak, dB',
  flags: 'Flags',
  windSpeed: 'Wind speed, m/s',
  windDirection: 'Wind direction, °',
  temperature: 'Temperature, °C',
  battery: 'Battery, V',
};

/** "11.4 MB". */
export function sizeWords(bytes: number): string {
  if (bytes < 1000) return `${bytes} B`;
  if (bytes < 1e6) return `${(bytes / 1e3).toFixed(1)} kB`;
  return bytes < 1e9 ? `${(bytes / 1e6).toFixed(1)} MB` : `${(bytes / 1e9).toFixed(2)} GB`;
}

/** A count with thin groups: "2 600 000". */
export function countWords(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+$)/g, '\u202f');
}

/** How far the work under way has come, 0–1; null where it cannot be told. */
export function shareDone({ state, bytes, bytesDone, report, ...one }: Import): number | null {
  if (state === 'checking') return bytes === 0 ? null : bytesDone / bytes;
  if (report.accepted === 0) return null;
  const gone = one.stored + one.knownMeanwhile + one.refusedMeanwhile;
  if (state === 'storing') return Math.min(1, gone / report.accepted);
  return state === 'undoing' ? 1 - Math.min(1, one.stored / report.accepted) : null;
}
