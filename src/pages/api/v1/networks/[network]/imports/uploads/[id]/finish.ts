import { finishUpload } from '#ingest/imports/uploads/finish';
import { requireNetwork } from '#lib/auth/guards';
import { importIdOf, unknownUpload, uploadProblem } from '#lib/http/importOutcome';
import { Problem } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async (context) => {
  const { network, settings, user } = await requireNetwork(context, context.params.network, ['operator']);
  const id = importIdOf(context.params.id);
  try {
    const outcome = await finishUpload({
      networkId: network.id,
      id,
      userId: user.id,
      zone: settings.timeZone,
    });
    if (outcome.kind === 'unknown') throw unknownUpload();
    if (outcome.kind === 'incomplete') {
      const members = { offset: outcome.offset };
      throw new Problem(409, 'incomplete', 'Not wholly here', outcome.message, { members });
    }
    const location = `/api/v1/networks/${network.slug}/imports/${outcome.import.id}`;
    return json({ import: outcome.import }, { status: 201, headers: { Location: location } });
  } catch (error) {
    throw uploadProblem(error);
  }
});
