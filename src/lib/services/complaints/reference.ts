import { nextComplaintNumber } from '#db/queries/complaints';
import type { Connection } from '#db/queries/connection';

const PREFIX_LETTERS = 3;

/**
 * A new reference such as `MER-2026-0042`: first letters of the network's slug, year, number of that prefix in that year.
 * Two networks of one prefix share the numbers, so a reference is unique wherever it is quoted.
 */
export async function newReference(slug: string, year: number, transaction: Connection): Promise<string> {
  const prefix = slug
    .replace(/[^a-z0-9]/gi, '')
    .slice(0, PREFIX_LETTERS)
    .toUpperCase();
  const number = await nextComplaintNumber(prefix, year, transaction);
  return `${prefix}-${year}-${String(number).padStart(4, '0')}`;
}
