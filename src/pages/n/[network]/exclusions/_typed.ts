import { isExclusionReason, MOST_DETAIL_CHARACTERS, reasonWords } from '#components/exclusions/reasons.ts';
import { formatInstantUtc } from '#lib/contracts/common';
import { bulkExclusionSchema, type BulkExclusion } from '#lib/contracts/exclusions';
import { type FormValues } from '#lib/http/forms';
import { invalidFields } from '#lib/http/problem';
import { parseUrlInstant } from '#lib/time/urlPeriod';

/** What was typed into the form of an exclusion. @throws {Problem} with the fields to put right. */
export function typedExclusion({ text, all }: FormValues, zone: string): BulkExclusion {
  return bulkExclusionSchema.parse({
    stations: text['scope'] === 'all' ? null : all('stations'),
    from: instantOf(text, 'from', 'the beginning', zone),
    to: instantOf(text, 'to', 'the end', zone),
    reason: reasonOf(text),
  });
}

function instantOf(text: FormValues['text'], field: 'from' | 'to', what: string, zone: string): string {
  const sec = parseUrlInstant(text[field] ?? '', zone);
  if (sec === null) throw invalidFields([{ field, message: `give ${what} as date and time of day` }]);
  return formatInstantUtc(sec);
}

function reasonOf(text: FormValues['text']): string {
  const kind = text['kind'] ?? '';
  if (!isExclusionReason(kind)) throw invalidFields([{ field: 'kind', message: 'choose one of the list' }]);
  const detail = text['detail'] ?? '';
  if (detail.length > MOST_DETAIL_CHARACTERS) {
    const message = `must have at most ${MOST_DETAIL_CHARACTERS} characters`;
    throw invalidFields([{ field: 'detail', message }]);
  }
  if (kind === 'other' && detail === '') {
    throw invalidFields([{ field: 'detail', message: 'say what it was' }]);
  }
  return reasonWords(kind, detail);
}
