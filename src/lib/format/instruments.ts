import { formatDifferenceDb } from './levels';
import { formatDate } from './times';

interface MadeBy {
  serialNumber: string;
  class: 1 | 2;
  description: string;
  microphone: string;
  lastCheck: { at: string; drift: number; isWithinBound: boolean } | null;
}

/** An instrument for people, with its latest check: "Logger 5, class 1, serial number 1203, last checked Tue 3 March 2026 (+0.1 dB)". */
export function instrumentWords(instrument: MadeBy, zone: string): string {
  const { serialNumber, description, microphone, lastCheck } = instrument;
  return [
    description,
    `class ${instrument.class}`,
    `serial number ${serialNumber}`,
    microphone && `microphone ${microphone}`,
    checkWords(lastCheck, zone),
  ]
    .filter((part) => part !== '')
    .join(', ');
}

/** Instruments in order of time; the words for none are those of the record. */
export function instrumentsWords(instruments: readonly MadeBy[], zone: string): string {
  if (instruments.length === 0) return 'none is on record for this period';
  return instruments.map((instrument) => instrumentWords(instrument, zone)).join('; then ');
}

/** An instrument's latest check: "last checked Tue 3 March 2026 (+0.1 dB)". */
export function checkWords(check: MadeBy['lastCheck'], zone: string): string {
  if (!check) return 'no check on record before';
  const off = `${formatDifferenceDb(check.drift)} dB`;
  const verdict = check.isWithinBound ? off : `${off}, beyond its bound`;
  return `last checked ${formatDate(Date.parse(check.at) / 1000, zone)} (${verdict})`;
}
