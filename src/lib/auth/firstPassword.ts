import { randomInt } from 'node:crypto';

/** Without letters and digits that are taken for one another: 32 of them, 5 bits each. */
const ALPHABET = 'abcdefghijkmnpqrstuvwxyz23456789';

/** A password to hand over, easy to read out, of 100 random bits: `k7wmp-2tzha-…`. */
export function makeFirstPassword(): string {
  return randomCode(4, 5);
}

/** Random characters, 5 bits each, in groups. */
export function randomCode(groups: number, groupLength: number): string {
  return Array.from({ length: groups }, () => randomGroup(groupLength)).join('-');
}

function randomGroup(length: number): string {
  return Array.from({ length }, () => ALPHABET[randomInt(ALPHABET.length)]).join('');
}
