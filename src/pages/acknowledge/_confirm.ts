import type { requireAcknowledgeLink } from '#lib/auth/acknowledgeLink';
import { newAcknowledgementSchema } from '#lib/contracts/exceedances';
import { submitForm, type FormErrors } from '#lib/http/forms';
import { notFound, Problem } from '#lib/http/problem';
import { acknowledge, CHANGED_MEANWHILE } from '#lib/services/exceedances/acknowledge';

/** Acknowledges as the confirmation says; null when it is done, else what is wrong and what was typed. */
export async function confirmFromForm(
  request: Request,
  { network, user, exceedanceId }: Awaited<ReturnType<typeof requireAcknowledgeLink>>,
): Promise<{ typed: Readonly<Record<string, string>>; errors: FormErrors } | null> {
  const submission = await submitForm(request, async ({ text }) => {
    const given = newAcknowledgementSchema.parse({
      note: text['note'],
      cause: text['cause'] || null,
      causeDetail: text['causeDetail'],
      version: text['version'],
    });
    const who = { networkId: network.id, id: exceedanceId, userId: user.id };
    const outcome = await acknowledge({ ...who, given, isByMailLink: true });
    if (outcome.kind === 'unknown') throw notFound();
    if (outcome.kind === 'changed-meanwhile') {
      throw new Problem(409, outcome.kind, 'Changed meanwhile', CHANGED_MEANWHILE);
    }
  });
  return submission.isDone ? null : { typed: submission.values.text, errors: submission.errors };
}
