import { randomInt } from 'node:crypto';

/** Without letters and digits that are taken for one another: 32 of them, 5 bits each. */
const ALPHABET = 'abcdefghijkmnpqrstuvwxyz23456789';
const GROUPS = 4;
const GROUP_LENGTH = 5;

/** A password to hand over, easy to read out, of 100 random bits: `k7wmp-2tzha-…`. */
export function makeFirstPassword(): string {
  return Array.from({ length: GROUPS }, randomGroup).join('-');
}

function randomGroup(): string {
  return Array.from({ length: GROUP_LENGTH }, () => ALPHABET[randomInt(ALPHABET.length)]).join('');
}
