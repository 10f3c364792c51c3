import type { ComplaintKind } from '#lib/contracts/complaints';

/** What a resident is said to have reported. */
export const REPORTED: Readonly<Record<ComplaintKind, string>> = {
  hum: 'the hum',
  whine: 'the whining sound',
  bang: 'the bangs',
  rumble: 'the rumble',
  music: 'the music',
  traffic: 'the traffic noise',
  alarm: 'the alarm',
  other: 'the noise',
};

const SMALL_NUMBERS = ['none', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight'];

/** A small count as a word. */
export function numberInWords(count: number): string {
  return SMALL_NUMBERS[count] ?? String(count);
}

/** An A-weighted level that was rounded to tenths already: `52.3 dB(A)`. */
export function levelInWords(levelDb: number): string {
  return `${levelDb.toFixed(1).replace('-', '−')} dB(A)`;
}

/** A difference of levels in tenths of a dB: `4.8 dB`. */
export function differenceInWords(tenths: number): string {
  return `${(Math.abs(tenths) / 10).toFixed(1)} dB`;
}

/** A share in whole per cent, rounded down as on every page, so that "100 %" is said of the whole only. */
export function shareInWords(share: number): string {
  const percent = Math.floor(share * 100 + 1e-9);
  return percent === 0 && share > 0 ? 'less than 1 %' : `${percent} %`;
}
