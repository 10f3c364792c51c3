import { formatInstant } from './times';

/** Of when data are, in words: as they are now (null), or as a replica had them at an instant, epoch seconds. */
export function asOfWords(asOfSec: number | null, zone: string): string {
  return asOfSec === null ? 'as they are now' : `as they were ${formatInstant(asOfSec, zone)}`;
}
