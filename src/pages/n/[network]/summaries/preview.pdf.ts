import { requireNetwork } from '#lib/auth/guards';
import { submitForm } from '#lib/http/forms';
import { invalidFields } from '#lib/http/problem';
import { route } from '#lib/http/route';
import { previewPdf } from '#lib/services/summaries/template/preview';
import { markFromForm, settingsFromForm } from './_settingsForm';

/** The latest month that is over as the posted, unsaved settings would print it; nothing is kept. */
export const POST = route(async (context) => {
  const { network } = await requireNetwork(context, context.params['network'], ['operator']);
  const submission = await submitForm(context.request, async (values) =>
    previewPdf(network, settingsFromForm(values), await markFromForm(values), new Date()),
  );
  if (!submission.isDone) {
    throw invalidFields(Object.entries(submission.errors).map(([field, message]) => ({ field, message })));
  }
  return new Response(new Uint8Array(submission.value), {
    headers: {
      'Content-Type': 'application/pdf',
      'Content-Disposition': 'inline; filename="preview.pdf"',
      'Cache-Control': 'no-store',
    },
  });
});
