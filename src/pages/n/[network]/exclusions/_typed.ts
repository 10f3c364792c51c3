import { isExclusionReason, MOST_DETAIL_CHARACTERS, reasonWords } from '#components/exclusions/reasons.ts';
import { formatInstantUtc } from '#lib/contracts/common';
import { bulkExclusionSchema, type BulkExclusion } from '#lib/contracts/exclusions';
import { type FormValues } from '#lib/http/forms';
import { invalidFields } from '#lib/http/problem';
import { type FieldProblem } from '#lib/services/outcome';
import { parseUrlInstant } from '#lib/time/urlPeriod';

/** What was typed into the form of an exclusion. @throws {Problem} with the fields to put right. */
export function typedExclusion({ text, all }: FormValues, zone: string): BulkExclusion {
  const stations = text['scope'] === 'all' ? null : all('stations');
  const from = parseUrlInstant(text['from'] ?? '', zone);
  const to = parseUrlInstant(text['to'] ?? '', zone);
  const reason = reasonOf(text);
  const problems = [
    stations?.length === 0 && { field: 'stations', message: 'choose at least one' },
    from === null && { field: 'from', message: 'give the beginning as date and time of day' },
    to === null && { field: 'to', message: 'give the end as date and time of day' },
    'message' in reason && reason,
  ].filter((problem) => problem !== false && problem !== undefined);
  if (problems.length > 0 || from === null || to === null || 'message' in reason) {
    throw invalidFields(problems);
  }
  return bulkExclusionSchema.parse({
    stations,
    from: formatInstantUtc(from),
    to: formatInstantUtc(to),
    reason: reason.words,
  });
}

/** The reason as it is kept, or what is wrong with it. */
function reasonOf(text: FormValues['text']): { words: string } | FieldProblem {
  const [kind, detail] = [text['kind'] ?? '', text['detail'] ?? ''];
  if (!isExclusionReason(kind)) return { field: 'kind', message: 'choose one of the list' };
  if (detail.length > MOST_DETAIL_CHARACTERS) {
    return { field: 'detail', message: `must have at most ${MOST_DETAIL_CHARACTERS} characters` };
  }
  if (kind === 'other' && detail === '') return { field: 'detail', message: 'say what it was' };
  return { words: reasonWords(kind, detail) };
}
