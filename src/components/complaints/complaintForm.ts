import type { z } from 'zod';
import { formatInstantUtc } from '#lib/contracts/common';
import { newComplaintSchema, type NewComplaint } from '#lib/contracts/complaints';
import { spokenWindow } from '#lib/time/spokenWindow';
import { parseUrlInstant } from '#lib/time/urlPeriod';

/** Fields of the form as typed, so that nothing is lost on an error. */
export const COMPLAINT_FIELDS = [
  'when',
  'from',
  'to',
  'kind',
  'station',
  'area',
  'latitude',
  'longitude',
  'words',
  'name',
  'email',
  'phone',
  'address',
] as const;
export type ComplaintField = (typeof COMPLAINT_FIELDS)[number];
export type TypedComplaint = Record<ComplaintField, string>;

export type FieldErrors = Partial<Record<ComplaintField, string>>;

export type ReadComplaint =
  { isValid: true; complaint: NewComplaint } | { isValid: false; errors: FieldErrors };

/** The texts of a form's fields; those that are missing are empty. */
export function typedFields<Field extends string>(
  source: FormData | URLSearchParams,
  fields: readonly Field[],
): Record<Field, string> {
  const entries = fields.map((field) => {
    const value = source.get(field);
    return [field, typeof value === 'string' ? value : ''] as const;
  });
  return Object.fromEntries(entries) as Record<Field, string>;
}

/**
 * Reads what was typed; times are local to `zone` unless they carry an offset. What was said of the time goes before the exact times;
 * `nowSec` is when it was said.
 */
export function readComplaint(typed: TypedComplaint, zone: string, nowSec: number): ReadComplaint {
  const isSaid = typed.when.trim() !== '';
  const said = isSaid ? spokenWindow(typed.when, zone, nowSec) : null;
  const from = isSaid ? (said?.fromSec ?? null) : parseUrlInstant(typed.from, zone);
  const to = isSaid ? (said?.toSec ?? null) : parseUrlInstant(typed.to, zone);
  const isEmpty = !isSaid && typed.from === '' && typed.to === '';
  const errors: FieldErrors =
    isSaid || isEmpty
      ? whenErrors(isSaid, said !== null)
      : {
          ...(from === null ? { from: UNREADABLE_TIME } : {}),
          ...(to === null ? { to: UNREADABLE_TIME } : {}),
        };
  const parsed = newComplaintSchema.safeParse({
    // A time that cannot be read is told by itself; the other fields are judged beside a stand-in for it.
    from: formatInstantUtc(from ?? Math.max(0, (to ?? 1) - 1)),
    to: formatInstantUtc(to ?? (from ?? 0) + 1),
    kind: typed.kind,
    latitude: numberOf(typed.latitude),
    longitude: numberOf(typed.longitude),
    station: typed.station === '' ? null : typed.station,
    area: typed.area === '' ? null : typed.area,
    words: typed.words,
    contact: { name: typed.name, email: typed.email.trim(), phone: typed.phone, address: typed.address },
  });
  if (parsed.success && from !== null && to !== null) return { isValid: true, complaint: parsed.data };
  return { isValid: false, errors: { ...(parsed.error ? fieldErrors(parsed.error) : {}), ...errors } };
}

function whenErrors(isSaid: boolean, isUnderstood: boolean): FieldErrors {
  if (isUnderstood) return {};
  return {
    when: isSaid
      ? 'was not understood, or has not come yet; say it like “last night about 3”, “yesterday 22:30-23” or “14 mar 3:10”'
      : 'must say when it was heard',
  };
}

const UNREADABLE_TIME = 'must be a date and time such as 2026-03-17T03:10';

/** Errors by the form's field; of several the first. */
export function fieldErrors(error: z.ZodError): FieldErrors {
  const errors: FieldErrors = {};
  for (const issue of error.issues) {
    const field = COMPLAINT_FIELDS.find((known) => known === issue.path.at(-1));
    if (field) errors[field] ??= issue.message;
  }
  return errors;
}

function numberOf(text: string): number | string | null {
  const trimmed = text.trim().replace('−', '-');
  if (trimmed === '') return null;
  return /^-?\d{1,3}(\.\d+)?$/.test(trimmed) ? Number(trimmed) : trimmed;
}
