import { typedFields } from '#components/complaints/complaintForm.ts';
import {
  MOST_ATTACHMENT_BYTES,
  REPORT_FIELDS,
  type ReportLanguage,
  type TypedReport,
} from '#lib/contracts/reports';
import { Problem } from '#lib/http/problem';
import { boundedRequest } from '#lib/http/readBytes';
import type { PostedReport } from '#lib/services/reports/takeReport';

/** A file that is too large is told beside its field as long as the whole form fits in here; above, the form is lost. */
const MOST_FORM_BYTES = 2 * MOST_ATTACHMENT_BYTES + 1024 * 1024;

/** What a resident sent. `isTooLarge`: so much that nothing of it was read. */
export interface ReadPost {
  form: FormData;
  isTooLarge: boolean;
}

/** Reads a posted form, whatever it is: what is no form counts as an empty one. */
export async function readPost(request: Request): Promise<ReadPost> {
  try {
    const bounded = await boundedRequest(request, MOST_FORM_BYTES);
    return { form: await bounded.formData(), isTooLarge: false };
  } catch (error) {
    const isTooLarge = error instanceof Problem && error.status === 413;
    if (!isTooLarge && !(error instanceof TypeError)) throw error;
    return { form: new FormData(), isTooLarge };
  }
}

/** The report as typed; the file's own name is not looked at. */
export async function postedReport(
  form: FormData,
  language: ReportLanguage,
  address: string,
): Promise<PostedReport> {
  const { website, stamp } = typedFields(form, ['website', 'stamp']);
  const file = form.get('file');
  const isFile = file instanceof File && file.size > 0;
  return {
    typed: typedReport(form),
    fileBytes: isFile ? new Uint8Array(await file.arrayBuffer()) : null,
    hidden: website,
    stamp,
    language,
    address,
  };
}

/** Everything that was typed, so that nothing is lost on an error. */
export function typedReport(form: FormData): TypedReport {
  const effects = form.getAll('effects').filter((value) => typeof value === 'string');
  return { ...typedFields(form, REPORT_FIELDS), effects };
}
