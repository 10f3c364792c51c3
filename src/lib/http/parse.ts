import type { z } from 'zod';
import { localDate, parseInstant } from '#lib/contracts/common';
import { badRequest, Problem } from './problem';

const MOST_JSON_BYTES = 1024 * 1024;
const MOST_PERIOD_SEC = 10 * 366 * 86_400;
const LATEST_SEC = 4_294_967_295;

/** Reads a small JSON body and validates it. @throws {Problem} 413, 415, 400; zod errors become 422. */
export async function readJson<T extends z.ZodType>(request: Request, schema: T): Promise<z.output<T>> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^application\/json\s*(;|$)/i.test(type)) {
    throw new Problem(
      415,
      'wrong-type',
      'Wrong content type',
      'Send JSON with Content-Type: application/json.',
    );
  }
  const text = await request.text();
  if (text.length > MOST_JSON_BYTES) {
    throw new Problem(413, 'too-large', 'Too large', 'The body may have at most 1 MiB.');
  }
  let body: unknown;
  try {
    body = JSON.parse(text);
  } catch {
    throw badRequest('The body is not JSON.');
  }
  return schema.parse(body);
}

/** A half-open period, epoch seconds. */
export interface Period {
  fromSec: number;
  toSec: number;
}

/** The period in `from` and `to` (RFC 3339, any offset). @throws {Problem} 400 with what is wrong. */
export function parsePeriod(url: URL): Period {
  const fromSec = instantParameter(url, 'from');
  const toSec = instantParameter(url, 'to');
  if (fromSec >= toSec) throw badRequest('`from` must be before `to`.');
  if (toSec - fromSec > MOST_PERIOD_SEC) throw badRequest('The period may span at most ten years.');
  return { fromSec, toSec };
}

/** As `parsePeriod`, where either end may be left out: the list is then open there. */
export function parseOptionalPeriod(url: URL): Period {
  const fromSec = url.searchParams.has('from') ? instantParameter(url, 'from') : 0;
  const toSec = url.searchParams.has('to') ? instantParameter(url, 'to') : LATEST_SEC;
  if (fromSec >= toSec) throw badRequest('`from` must be before `to`.');
  return { fromSec, toSec };
}

/** The local dates in `from` and `to` (exclusive). @throws {Problem} 400 with what is wrong. */
export function parseDates(url: URL): { fromDate: string; toDate: string } {
  const fromDate = dateParameter(url, 'from');
  const toDate = dateParameter(url, 'to');
  if (fromDate >= toDate) throw badRequest('`from` must be before `to`.');
  const spanSec = (Date.parse(toDate) - Date.parse(fromDate)) / 1000;
  if (spanSec > MOST_PERIOD_SEC) throw badRequest('The period may span at most ten years.');
  return { fromDate, toDate };
}

function dateParameter(url: URL, name: string): string {
  const parsed = localDate.safeParse(url.searchParams.get(name));
  // Before 1970 and after the year 2105 there are no stored seconds.
  if (!parsed.success || parsed.data < '1970-01-02' || parsed.data > '2106-01-01') {
    throw badRequest(`\`${name}\` must be a date such as 2026-03-01.`);
  }
  return parsed.data;
}

/** One of some words in the query; the first of them when it is left out. */
export function parseChoice<T extends string>(url: URL, name: string, choices: readonly [T, ...T[]]): T {
  const text = url.searchParams.get(name);
  if (text === null) return choices[0];
  const choice = choices.find((candidate) => candidate === text);
  if (!choice) throw badRequest(`\`${name}\` must be one of ${choices.join(', ')}.`);
  return choice;
}

/** The instant in a parameter (RFC 3339, any offset). @throws {Problem} 400 where it is missing or none. */
export function instantParameter(url: URL, name: string): number {
  const text = url.searchParams.get(name);
  if (text === null)
    throw badRequest(`\`${name}\` is missing: give an RFC 3339 time such as 2026-03-01T00:00:00Z.`);
  // A plus sign that was not escaped in the address arrives as a space.
  const seconds = parseInstant(text.replace(/ (?=\d{2}:\d{2}$)/, '+'));
  if (seconds === null || seconds < 0 || seconds > LATEST_SEC) {
    throw badRequest(`\`${name}\` is not an RFC 3339 time such as 2026-03-01T00:00:00Z.`);
  }
  return Math.floor(seconds);
}

/** An instant in the query, epoch seconds; now where it is left out. @throws {Problem} 400 with what is wrong. */
export function parseInstantOrNow(url: URL, name: string): number {
  return url.searchParams.has(name) ? instantParameter(url, name) : Math.floor(Date.now() / 1000);
}

/** A whole number in the query between bounds, or its default. */
export function parseCount(
  url: URL,
  name: string,
  { fallback, most }: { fallback: number; most: number },
): number {
  const text = url.searchParams.get(name);
  if (text === null) return fallback;
  const value = /^\d{1,9}$/.test(text) ? Number(text) : 0;
  if (value < 1 || value > most) throw badRequest(`\`${name}\` must be a whole number from 1 to ${most}.`);
  return value;
}

/** The place that a list goes on from, as made by `makeCursor`; null at its beginning. */
export function parseCursor(url: URL): number[] | null {
  const text = url.searchParams.get('cursor');
  if (text === null) return null;
  const parts = Buffer.from(text, 'base64url').toString('utf8').split('.');
  if (!parts.every((part) => /^\d{1,15}$/.test(part)))
    throw badRequest('`cursor` is not one that a list has given.');
  return parts.map(Number);
}

/** An opaque cursor of the last item's sorting numbers. */
export function makeCursor(parts: number[]): string {
  return Buffer.from(parts.join('.')).toString('base64url');
}
