import { release } from '#ingest/quarantine/release';
import { replaceStored } from '#ingest/quarantine/replace';
import { requireNetwork } from '#lib/auth/guards';
import { releaseSchema } from '#lib/contracts/quarantine';
import { readJson } from '#lib/http/parse';
import { quarantineChoiceOf } from '#lib/http/quarantineFilter';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const asked = await readJson(context.request, releaseSchema);
  const by = { userId: user.id, networkId: network.id };
  const [id] = asked.ids ?? [];
  if (asked.replace && asked.reason && id !== undefined) {
    return json({ outcome: await replaceStored(id, { ...by, reason: asked.reason }, new Date()) });
  }
  const choice = await quarantineChoiceOf(asked, network.id, 'open');
  return json({ outcome: await release(choice, { ...by, reason: asked.reason ?? null }, new Date()) });
});
