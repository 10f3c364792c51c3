import { newActivitySchema, type ActivityFileReport } from '#lib/contracts/activities';
import { formatInstantUtc } from '#lib/contracts/common';
import type { PostedForm } from '#lib/http/forms';
import { valueOf } from '#lib/http/outcome';
import { invalidFields } from '#lib/http/problem';
import { noteFile } from '#lib/services/activities/file';
import { noteActivity } from '#lib/services/activities/note';
import { parseUrlInstant } from '#lib/time/urlPeriod';

interface Setting {
  networkId: number;
  userId: string;
  zone: string;
}

/** What was noted: an entry, or the lines of a file. */
type Noted = { kind: 'entry'; id: number } | { kind: 'file'; report: ActivityFileReport };

/**
 * Notes an activity or a file of them as the forms tell.
 * @throws {Problem} and zod errors, with what is wrong by field.
 */
export async function noteFromForm(form: PostedForm, setting: Setting): Promise<Noted> {
  if (form.text['act'] === 'file') {
    const file = form.file('file');
    if (!file) throw invalidFields([{ field: 'file', message: 'must be chosen' }]);
    return { kind: 'file', report: valueOf(await noteFile(setting, await file.text())) };
  }
  const { kind = '', place = '', note = '', from = '', to = '' } = form.text;
  const input = newActivitySchema.parse({
    kind,
    place,
    note,
    from: instantOf(from, 'from', setting.zone),
    to: instantOf(to, 'to', setting.zone),
  });
  const { id } = valueOf(await noteActivity(setting.networkId, input, setting.userId));
  return { kind: 'entry', id };
}

function instantOf(text: string, field: string, zone: string): string {
  const sec = parseUrlInstant(text, zone);
  if (sec === null) {
    throw invalidFields([{ field, message: 'must be a date and time such as 2026-03-17T14:30' }]);
  }
  return formatInstantUtc(sec);
}
