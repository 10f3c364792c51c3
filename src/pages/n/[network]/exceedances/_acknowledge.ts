import { newAcknowledgementSchema } from '#lib/contracts/exceedances';
import { submitForm } from '#lib/http/forms';
import { notFound, Problem } from '#lib/http/problem';
import { acknowledge, CHANGED_MEANWHILE } from '#lib/services/exceedances/acknowledge';

/** What a refused acknowledgement shows again. */
export interface RefusedAcknowledgement {
  typed: Readonly<Record<string, string>>;
  errors: Readonly<Record<string, string>>;
}

/** Acknowledges as the page's form says; null when it is done. The caller has made sure that the person is an operator. */
export async function acknowledgeFromForm(
  request: Request,
  who: { networkId: number; id: number; userId: string },
): Promise<RefusedAcknowledgement | null> {
  const submission = await submitForm(request, async ({ text }) => {
    const given = newAcknowledgementSchema.parse({
      note: text['note'],
      cause: text['cause'] || null,
      causeDetail: text['causeDetail'],
      version: text['version'],
    });
    const outcome = await acknowledge({ ...who, given });
    if (outcome.kind === 'unknown') throw notFound();
    if (outcome.kind === 'changed-meanwhile') {
      throw new Problem(409, outcome.kind, 'Changed meanwhile', CHANGED_MEANWHILE);
    }
  });
  return submission.isDone ? null : { typed: submission.values.text, errors: submission.errors };
}
